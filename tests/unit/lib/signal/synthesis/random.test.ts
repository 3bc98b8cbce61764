import { describe, expect, it } from 'vitest';
import { createRandom } from '#lib/signal/synthesis/random.ts';

describe('createRandom', () => {
  it('repeats itself for the same seed and differs for another', () => {
    const sequence = (seed: number) => Array.from({ length: 8 }, createRandom(seed).uniform);
    expect(sequence(7)).toEqual(sequence(7));
    expect(sequence(7)).not.toEqual(sequence(8));
  });

  it('draws uniform numbers in [0, 1) with mean ½ and variance 1/12', () => {
    const random = createRandom(1);
    const values = Array.from({ length: 20_000 }, random.uniform);
    const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
    const variance = values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length;
    expect(Math.min(...values)).toBeGreaterThanOrEqual(0);
    expect(Math.max(...values)).toBeLessThan(1);
    // Four standard errors of 20,000 draws.
    expect(Math.abs(mean - 0.5)).toBeLessThan(0.0082);
    expect(Math.abs(variance - 1 / 12)).toBeLessThan(0.0022);
  });

  it('draws normal numbers of which 95.45 % lie within two standard deviations', () => {
    const random = createRandom(2);
    const inside = Array.from({ length: 20_000 }, random.normal).filter((value) => Math.abs(value) < 2).length;
    expect(inside / 20_000).toBeGreaterThan(0.9545 - 0.006);
    expect(inside / 20_000).toBeLessThan(0.9545 + 0.006);
  });
});
