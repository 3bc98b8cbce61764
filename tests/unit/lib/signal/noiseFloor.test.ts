import { describe, expect, it } from 'vitest';
import { subtractNoiseFloor } from '#lib/signal/noiseFloor.ts';
import { createRandom } from '#lib/signal/synthesis/random.ts';

/** ln of exponential noise whose mean rises by `slope` nepers from end to end. */
function exponentialNoise(binCount: number, slope: number): Float32Array {
  const random = createRandom(9);
  return Float32Array.from(
    { length: binCount },
    (_, bin) => Math.log(-Math.log(1 - random.uniform())) + (slope * bin) / binCount,
  );
}

function moments(values: Float32Array): { mean: number; deviation: number } {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  const variance = values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length;
  return { mean, deviation: Math.sqrt(variance) };
}

describe('subtractNoiseFloor', () => {
  // ln of an exponential variable: mean −0.5772 below ln of the mean, standard deviation π/√6 = 1.2825.
  it('leaves noise its standard deviation of 1.2825 nepers on a floor that rises by 20', () => {
    const { deviation } = moments(subtractNoiseFloor(exponentialNoise(8192, 20), 40));
    // The running mean of 81 bins takes away 1/81 of the variance; 8192 bins scatter by 1 %.
    expect(deviation).toBeGreaterThan(1.22);
    expect(deviation).toBeLessThan(1.33);
  });

  it('leaves a line of 12 nepers its height within 0.5 on a comb every 16 bins', () => {
    const levels = exponentialNoise(4096, 0);
    for (let bin = 8; bin < levels.length; bin += 16) levels[bin] = 12;
    subtractNoiseFloor(levels, 40);
    const lines = levels.filter((_, bin) => bin % 16 === 8);
    // Noise lies 0.58 + about 0.3 (clipping at 0.7) below ln of its mean, so a line of 12 stands near 12.6 above it.
    expect(moments(lines).mean).toBeGreaterThan(12.1);
    expect(moments(lines).mean).toBeLessThan(13.1);
  });

  it('returns the array that it was given', () => {
    const levels = exponentialNoise(64, 0);
    expect(subtractNoiseFloor(levels, 8)).toBe(levels);
  });
});
