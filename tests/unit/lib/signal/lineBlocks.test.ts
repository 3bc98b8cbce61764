import { describe, expect, it } from 'vitest';
import { eventPhase } from '#lib/signal/eventTrack.ts';
import { blockCoherence, demodulateLines } from '#lib/signal/lineBlocks.ts';
import { createRandom } from '#lib/signal/synthesis/random.ts';

const sampleRateHz = 12_000;
const phase = eventPhase({ eventHz: new Float64Array(40).fill(150), isActive: new Uint8Array(40).fill(1) });
const grid = { firstCycle: 3, cyclesPerBlock: 5, blockCount: 100 };

describe('demodulateLines', () => {
  it('gives half the amplitude and the phase of each harmonic and nothing of its neighbours', () => {
    const samples = Float32Array.from(
      { length: 4 * sampleRateHz },
      (_, n) => 0.6 * Math.cos((2 * Math.PI * 300 * n) / sampleRateHz + 0.7),
    );
    const [first, second] = demodulateLines({ samples, sampleRateHz }, phase, grid, {
      harmonics: [1, 2],
      medianHz: 150,
    });
    for (let block = 0; block < grid.blockCount; block++) {
      const amplitude = Math.hypot(second?.real[block] ?? 0, second?.imaginary[block] ?? 0);
      expect(amplitude).toBeCloseTo(0.3, 4);
      expect(Math.atan2(second?.imaginary[block] ?? 0, second?.real[block] ?? 0)).toBeCloseTo(0.7, 4);
      expect(Math.hypot(first?.real[block] ?? 1, first?.imaginary[block] ?? 1)).toBeLessThan(1e-4);
    }
  });
});

describe('blockCoherence', () => {
  it('is near 1 − 2.2/√99 for a pure line and below 0.1 for noise', () => {
    const random = createRandom(3);
    const line = { harmonic: 1, real: new Float64Array(100).fill(0.4), imaginary: new Float64Array(100).fill(0.3) };
    expect(blockCoherence(line)).toBeCloseTo(1 - 2.2 / Math.sqrt(99), 6);
    const noise = {
      harmonic: 1,
      real: Float64Array.from({ length: 100 }, random.normal),
      imaginary: Float64Array.from({ length: 100 }, random.normal),
    };
    expect(blockCoherence(noise)).toBeLessThan(0.1);
  });

  it('is 0 for silence', () => {
    expect(blockCoherence({ harmonic: 1, real: new Float64Array(9), imaginary: new Float64Array(9) })).toBe(0);
  });
});
