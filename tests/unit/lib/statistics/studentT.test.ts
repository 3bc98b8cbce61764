import { describe, expect, it } from 'vitest';
import { studentTQuantile } from '#lib/statistics/studentT.ts';

/** NIST Technical Note 1297 (1994), Table B.1: ν, then t for 90 %, 95 % and 99 %, printed to two decimals. */
const NIST_TABLE: readonly (readonly [number, number, number, number])[] = [
  [1, 6.31, 12.71, 63.66],
  [2, 2.92, 4.3, 9.92],
  [3, 2.35, 3.18, 5.84],
  [4, 2.13, 2.78, 4.6],
  [5, 2.02, 2.57, 4.03],
  [10, 1.81, 2.23, 3.17],
  [20, 1.72, 2.09, 2.85],
  [50, 1.68, 2.01, 2.68],
];
/** Half of the last printed digit, and a little for how it was rounded. */
const PRINTED_TOLERANCE = 0.006;

describe('studentTQuantile', () => {
  it.each(NIST_TABLE)('for %i degrees of freedom is what NIST prints for 90, 95 and 99 %%', (degrees, ...expected) => {
    const quantiles = [0.9, 0.95, 0.99].map((probability) => studentTQuantile(probability, degrees));
    for (const [index, quantile] of quantiles.entries()) {
      expect(Math.abs(quantile - (expected[index] ?? Number.NaN))).toBeLessThan(PRINTED_TOLERANCE);
    }
  });

  it.each([
    [1, 31.82],
    [2, 6.965],
    [4, 3.747],
    [10, 2.764],
    [15, 2.602],
  ])('for %i degrees of freedom is the one-sided 99 %% of 10 CFR 429 B, %f', (degrees, expected) => {
    // The regulation prints 4 significant digits, so half a unit of the last is at most 3e-4 of the value.
    expect(Math.abs(studentTQuantile(0.98, degrees) / expected - 1)).toBeLessThan(3e-4);
  });

  it('approaches the normal 1.959964 for many degrees of freedom', () => {
    // The first correction is z(z² + 1) / 4ν = 2.4 / ν.
    expect(studentTQuantile(0.95, 100_000)).toBeCloseTo(1.959964 + 2.4e-5, 5);
  });

  it('refuses a probability of 1 and half a degree of freedom', () => {
    expect(() => studentTQuantile(1, 4)).toThrow('studentTQuantile: probability must be in (0, 1), got 1');
    expect(() => studentTQuantile(0.95, 0.5)).toThrow(
      'studentTQuantile: degreesOfFreedom must be an integer ≥ 1, got 0.5',
    );
  });
});
