import { describe, expect, it } from 'vitest';
import { median, quantile, robustSpread } from '#lib/statistics/quantiles.ts';
import { createRandom } from '#lib/signal/synthesis/random.ts';

describe('quantile', () => {
  // Hyndman & Fan (1996), definition 7: position 1 + (n − 1)p. For 1 … 10 and p = 0.25 that is 3.25.
  it.each([
    [0, 1],
    [0.25, 3.25],
    [0.5, 5.5],
    [0.9, 9.1],
    [1, 10],
  ])('of 1 to 10 at %d is %d', (probability, expected) => {
    expect(quantile([10, 3, 1, 2, 9, 4, 8, 5, 7, 6], probability)).toBeCloseTo(expected, 12);
  });

  it('of nothing is NaN', () => {
    expect(quantile([], 0.5)).toBeNaN();
  });
});

describe('median', () => {
  it('is the middle of three and the mean of the middle two of four', () => {
    expect(median([3, 1, 2])).toBe(2);
    expect(median([4, 1, 3, 2])).toBe(2.5);
  });
});

describe('robustSpread', () => {
  it('estimates the standard deviation of normal values despite a tenth of outliers', () => {
    const random = createRandom(5);
    const values = Array.from({ length: 5000 }, (_, index) => (index % 10 === 0 ? 1000 : 2 * random.normal()));
    // A tenth of one-sided outliers biases the median absolute deviation of normal values up by about 13 %.
    expect(robustSpread(values)).toBeGreaterThan(1.9);
    expect(robustSpread(values)).toBeLessThan(2.5);
  });
});
