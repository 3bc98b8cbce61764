import { describe, expect, it } from 'vitest';
import { lineIntervals } from '#lib/statistics/lineIntervals.ts';
import { linearRegression } from '#lib/statistics/linearRegression.ts';
import { studentTQuantile } from '#lib/statistics/studentT.ts';

/** NIST Statistical Reference Datasets, linear regression: Norris, 36 points. */
const NORRIS_X = [
  0.2, 337.4, 118.2, 884.6, 10.1, 226.5, 666.3, 996.3, 448.6, 777, 558.2, 0.4, 0.6, 775.5, 666.9, 338, 447.5, 11.6, 556,
  228.1, 995.8, 887.6, 120.2, 0.3, 0.3, 556.8, 339.1, 887.2, 999, 779, 11.1, 118.3, 229.2, 669.1, 448.9, 0.5,
];
const NORRIS_Y = [
  0.1, 338.8, 118.1, 888, 9.2, 228.1, 668.5, 998.5, 449.1, 778.9, 559.2, 0.3, 0.1, 778.1, 668.8, 339.3, 448.9, 10.8,
  557.7, 228.3, 998, 888.8, 119.6, 0.3, 0.6, 557.6, 339.3, 888, 998.5, 778.9, 10.2, 117.6, 228.9, 668.4, 449.2, 0.2,
];

describe('lineIntervals', () => {
  it('gives the certified slope of NIST Norris and its 95 % interval', () => {
    const { slope } = lineIntervals(NORRIS_X, NORRIS_Y);
    // Certified to 15 digits; the tolerance catches sums that are not centred.
    expect(Math.abs(slope.value / 1.00211681802045 - 1)).toBeLessThan(1e-9);
    // Standard error 0.000429796848199937 (certified) times t = 2.0322445093 for 34 degrees of freedom.
    expect(Math.abs(slope.low / 1.0012433657355782 - 1)).toBeLessThan(1e-9);
    expect(Math.abs(slope.high / 1.0029902703053308 - 1)).toBeLessThan(1e-9);
  });

  it('finds 1000 rpm/V and 0.25 V of friction in an exact line', () => {
    const { slope, zeroCrossing } = lineIntervals([2, 3, 4, 5, 6], [1750, 2750, 3750, 4750, 5750]);
    expect(slope.value).toBeCloseTo(1000, 9);
    expect(zeroCrossing?.value).toBeCloseTo(0.25, 12);
  });

  it('ends the zero crossing where the band of the line still touches zero', () => {
    const x = [2, 3, 4, 5, 6];
    const y = [1790, 2710, 3770, 4730, 5760];
    const { zeroCrossing } = lineIntervals(x, y);
    const { slope, intercept, residualVariance, sumOfSquares } = linearRegression(x, y);
    for (const end of [zeroCrossing?.low, zeroCrossing?.high]) {
      const at = end ?? Number.NaN;
      const bandHalfWidth =
        studentTQuantile(0.95, 3) * Math.sqrt(residualVariance * (1 / 5 + (at - 4) ** 2 / sumOfSquares));
      // Fieller's interval is exactly the set of x whose confidence band holds y = 0.
      expect(Math.abs(intercept + slope * at)).toBeCloseTo(bandHalfWidth, 6);
    }
  });

  it('leaves the crossing open when the slope may be zero', () => {
    expect(lineIntervals([1, 2, 3], [5, 4, 5.5]).zeroCrossing).toBeNull();
  });

  it('refuses two points, which any line fits', () => {
    expect(() => lineIntervals([1, 2], [1, 2])).toThrow('lineIntervals: x must hold at least 3 values, got 2');
  });
});
