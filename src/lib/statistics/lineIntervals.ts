import { CONFIDENCE_LEVEL, type Interval } from './interval.ts';
import { linearRegression } from './linearRegression.ts';
import { studentTQuantile } from './studentT.ts';

/** A straight line with what the scatter of its points leaves open. */
export interface LineIntervals {
  readonly slope: Interval;
  /** Where the line crosses y = 0; null when the slope is not surely different from zero. */
  readonly zeroCrossing: Interval | null;
}

/**
 * Slope and zero crossing of the least-squares line with their 95 % intervals.
 *
 * @param x shape [n], n ≥ 3, not all equal, taken as exact
 * @param y shape [n], equal scatter at every x
 * @throws {RangeError} for fewer than three points, or where linearRegression throws
 * @example lineIntervals([1, 2, 3], [2, 4, 6]).slope.value // 2
 * Reference: N. Draper & H. Smith (1998), Applied regression analysis, section 1.4 (slope) and 3.2 (the x for a
 * given y, after Fieller: g is the squared relative half width of the slope; g ≥ 1 leaves the crossing open).
 */
export function lineIntervals(x: readonly number[], y: readonly number[]): LineIntervals {
  const count = x.length;
  if (count < 3) throw new RangeError(`lineIntervals: x must hold at least 3 values, got ${count}`);
  const { slope, intercept, residualVariance, sumOfSquares } = linearRegression(x, y);
  const halfWidth = studentTQuantile(CONFIDENCE_LEVEL, count - 2) * Math.sqrt(residualVariance / sumOfSquares);
  const g = (halfWidth / slope) ** 2;
  return {
    slope: { value: slope, low: slope - halfWidth, high: slope + halfWidth },
    zeroCrossing: g < 1 ? zeroCrossing() : null,
  };

  function zeroCrossing(): Interval {
    const crossing = -intercept / slope;
    const meanX = x.reduce((sum, value) => sum + value / count, 0);
    const middle = meanX + (crossing - meanX) / (1 - g);
    const reach =
      (Math.abs(halfWidth / slope) * Math.sqrt(((1 - g) * sumOfSquares) / count + (crossing - meanX) ** 2)) / (1 - g);
    return { value: crossing, low: middle - reach, high: middle + reach };
  }
}
