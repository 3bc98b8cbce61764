import { describe, expect, it } from 'vitest';
import { chiSquareQuantile } from '#lib/statistics/chiSquare.ts';

describe('chiSquareQuantile', () => {
  it.each([
    [1, 3.841],
    [5, 11.07],
    [10, 18.307],
  ])('for %i degrees of freedom at 0.95 is the tabled %f', (degrees, expected) => {
    // Tables of upper 5 % points, e.g. NIST/SEMATECH e-Handbook 1.3.6.7.4, print three decimals.
    expect(Math.abs(chiSquareQuantile(0.95, degrees) - expected)).toBeLessThan(6e-4);
  });

  it('is −2 ln(1 − p) for two degrees of freedom, the exponential distribution', () => {
    for (const probability of [0.025, 0.5, 0.975]) {
      // Closed form; only rounding differs.
      expect(chiSquareQuantile(probability, 2)).toBeCloseTo(-2 * Math.log(1 - probability), 12);
    }
  });

  it('at 20,000 degrees of freedom is within 1e-6 of the cube-root approximation', () => {
    const degrees = 20_000;
    const ninth = 2 / (9 * degrees);
    // Wilson & Hilferty (1931); its relative error falls with ν and is far below 1e-6 here.
    const approximation = degrees * (1 - ninth + 1.959964 * Math.sqrt(ninth)) ** 3;
    expect(Math.abs(chiSquareQuantile(0.975, degrees) / approximation - 1)).toBeLessThan(1e-6);
  });

  it('refuses a probability of 0 and no degrees of freedom', () => {
    expect(() => chiSquareQuantile(0, 4)).toThrow('chiSquareQuantile: probability must be in (0, 1), got 0');
    expect(() => chiSquareQuantile(0.5, 0)).toThrow(
      'chiSquareQuantile: degreesOfFreedom must be an integer ≥ 1, got 0',
    );
  });
});
