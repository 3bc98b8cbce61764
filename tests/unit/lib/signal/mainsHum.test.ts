import { describe, expect, it } from 'vitest';
import { detectMainsHum, isMainsMultiple, mainsGrids } from '#lib/signal/mainsHum.ts';
import { createRandom } from '#lib/signal/synthesis/random.ts';

const sampleRateHz = 12_000;

function harmonics(fundamentalHz: number, count: number, noise: number): Float32Array {
  const random = createRandom(11);
  return Float32Array.from({ length: 8 * sampleRateHz }, (_, n) => {
    let value = noise * random.normal();
    for (let harmonic = 1; harmonic <= count; harmonic++) {
      value += (0.1 / harmonic) * Math.cos((2 * Math.PI * harmonic * fundamentalHz * n) / sampleRateHz + harmonic);
    }
    return value;
  });
}

describe('detectMainsHum', () => {
  it.each([50, 60, 49.98, 60.02])('finds mains of %d Hz within 0.02 Hz', (mainsHz) => {
    const hum = detectMainsHum({ samples: harmonics(mainsHz, 8, 0.003), sampleRateHz });
    expect(Math.abs((hum?.mainsHz ?? 0) - mainsHz)).toBeLessThan(0.02);
    expect(hum?.harmonics).toContain(3);
  });

  it('does not take a shaft of 51 Hz for the mains, which stay within 0.1 % of nominal', () => {
    expect(detectMainsHum({ samples: harmonics(51, 8, 0.003), sampleRateHz })).toBeNull();
  });

  it('does not take every tenth line of a comb of 5 Hz for the mains', () => {
    expect(detectMainsHum({ samples: harmonics(5, 140, 0.0005), sampleRateHz })).toBeNull();
  });

  it('finds nothing in noise', () => {
    expect(detectMainsHum({ samples: harmonics(50, 0, 0.1), sampleRateHz })).toBeNull();
  });
});

describe('isMainsMultiple', () => {
  it('accepts 250.05 Hz and refuses 252 Hz and 20 Hz for mains of 50.01 Hz', () => {
    expect(isMainsMultiple(50.01, 250.05, 0.2)).toBe(true);
    expect(isMainsMultiple(50.01, 252, 0.2)).toBe(false);
    expect(isMainsMultiple(50.01, 20, 0.2)).toBe(false);
  });
});

describe('mainsGrids', () => {
  // EN 50160: interconnected grids keep 50 Hz within 1 % for 99.5 % of a year; a tenth of it is the usual day.
  it('spans 49.95 to 50.05 Hz and 59.94 to 60.06 Hz', () => {
    const grids = mainsGrids();
    const near50 = grids.filter((mainsHz) => mainsHz < 55);
    const near60 = grids.filter((mainsHz) => mainsHz > 55);
    expect([Math.min(...near50), Math.max(...near50)].map((hertz) => hertz.toFixed(3))).toEqual(['49.950', '50.050']);
    expect([Math.min(...near60), Math.max(...near60)].map((hertz) => hertz.toFixed(3))).toEqual(['59.940', '60.060']);
  });
});
