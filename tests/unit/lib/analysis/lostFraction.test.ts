import { describe, expect, it } from 'vitest';
import { lostFraction } from '#lib/analysis/lostFraction.ts';

const sampleRateHz = 1000;
/** Events are heard in the first four of ten frames of 0.1 s. */
const track = {
  eventHz: new Float64Array(10).fill(50),
  isActive: Uint8Array.from({ length: 10 }, (_, frame) => (frame < 4 ? 1 : 0)),
};

function soundOf(laterAmplitude: number): Float32Array {
  return Float32Array.from({ length: 1000 }, (_, n) => (n < 400 ? 1 : laterAmplitude) * Math.cos(n));
}

describe('lostFraction', () => {
  it('is 0.6 when the sound goes on as loud for six frames of ten', () => {
    expect(lostFraction(track, { samples: soundOf(1), sampleRateHz })).toBe(0.6);
  });

  it('is 0 when the sound falls by 20 dB', () => {
    expect(lostFraction(track, { samples: soundOf(0.1), sampleRateHz })).toBe(0);
  });

  it('is 0 when every frame is heard', () => {
    const everywhere = { ...track, isActive: new Uint8Array(10).fill(1) };
    expect(lostFraction(everywhere, { samples: soundOf(1), sampleRateHz })).toBe(0);
  });
});
