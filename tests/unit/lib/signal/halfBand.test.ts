import { describe, expect, it } from 'vitest';
import { LONG_HALF_BAND_PAIRS, SHORT_HALF_BAND_PAIRS, decimateByTwo } from '#lib/signal/halfBand.ts';

function sine(cyclesPerSample: number): Float32Array {
  return Float32Array.from({ length: 4096 }, (_, n) => Math.sin(2 * Math.PI * cyclesPerSample * n));
}

/** Amplitude in the middle, away from the ends where the filter has no neighbours. */
function amplitude(samples: Float32Array): number {
  const middle = samples.subarray(200, -200);
  return Math.sqrt((2 * middle.reduce((sum, value) => sum + value * value, 0)) / middle.length);
}

describe('decimateByTwo', () => {
  it('halves the number of samples', () => {
    expect(decimateByTwo(new Float32Array(1001), SHORT_HALF_BAND_PAIRS)).toHaveLength(500);
  });

  it('keeps a constant', () => {
    expect(decimateByTwo(new Float32Array(400).fill(0.5), LONG_HALF_BAND_PAIRS)[100]).toBeCloseTo(0.5, 6);
  });

  // The band that the method uses ends at 0.43 of the new rate, 0.215 of the old.
  it('keeps tones up to 0.215 of the rate within 0.5 dB', () => {
    for (const frequency of [0.01, 0.1, 0.2, 0.215]) {
      expect(amplitude(decimateByTwo(sine(frequency), LONG_HALF_BAND_PAIRS))).toBeGreaterThan(0.94);
      expect(amplitude(decimateByTwo(sine(frequency), LONG_HALF_BAND_PAIRS))).toBeLessThan(1.06);
    }
  });

  it('takes away what would fold into that band by 40 dB', () => {
    for (const frequency of [0.3, 0.4, 0.49]) {
      expect(amplitude(decimateByTwo(sine(frequency), LONG_HALF_BAND_PAIRS))).toBeLessThan(0.01);
    }
  });
});
