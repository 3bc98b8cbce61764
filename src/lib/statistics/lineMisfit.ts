import { CONFIDENCE_LEVEL, type Interval } from './interval.ts';
import { linearRegression } from './linearRegression.ts';
import { studentTQuantile } from './studentT.ts';

/** Three points must make the line that a fourth is held against, or nothing is known of the scatter. */
const POINTS_MINIMUM_COUNT = 4;

interface ScatteredPoints {
  /** Shape [n], taken as exact. */
  readonly x: readonly number[];
  /** Shape [n], equal scatter at every x. */
  readonly y: readonly number[];
  /** Shape [n], each in (0, ∞): what a y may be off by on top of the scatter without being called a misfit. */
  readonly allowance: readonly number[];
}

/** A point that does not lie on the line of the others. */
export interface LineMisfit {
  /** Its place in the given arrays. */
  readonly index: number;
  /** Where the line of the others expects it, with probability 1 − 0.05 / n. */
  readonly expected: Interval;
}

/**
 * The point that is furthest outside what the line through all the others expects at its place.
 *
 * @returns null when every point fits, for fewer than four points, and where leaving the point out leaves no line
 * @throws {RangeError} when the shapes differ
 * @example lineMisfit({ x: [1, 2, 3, 4], y: [2, 4, 3, 8], allowance: [0.1, 0.1, 0.1, 0.1] })?.index // 2
 * Reference: R. D. Cook & S. Weisberg (1982), Residuals and influence in regression, section 2.2.2: the residual of a
 * point left out, against Student's t with n − 3 degrees of freedom; shared among n tests (Bonferroni), so that
 * one set of sound points in twenty has a misfit by chance.
 */
export function lineMisfit({ x, y, allowance }: ScatteredPoints): LineMisfit | null {
  const count = x.length;
  if (y.length !== count || allowance.length !== count) {
    throw new RangeError(
      `lineMisfit: x, y and allowance must be equally long, got ${count}, ${y.length} and ${allowance.length}`,
    );
  }
  if (count < POINTS_MINIMUM_COUNT) return null;
  const factor = studentTQuantile(1 - (1 - CONFIDENCE_LEVEL) / count, count - 3);
  let worst: LineMisfit | null = null;
  let worstExcess = 1;
  for (let index = 0; index < count; index++) {
    const expected = expectedWithout(index, { x, y, factor });
    if (expected === null) continue;
    const reach = expected.high - expected.value + (allowance[index] as number);
    const excess = Math.abs((y[index] as number) - expected.value) / reach;
    if (!(excess > worstExcess)) continue;
    worstExcess = excess;
    worst = { index, expected };
  }
  return worst;
}

/** The prediction interval of the line through the other points; null when they all have one x. */
function expectedWithout(
  index: number,
  { x, y, factor }: { x: readonly number[]; y: readonly number[]; factor: number },
): Interval | null {
  const otherX = x.filter((_, place) => place !== index);
  if (otherX.every((value) => value === otherX[0])) return null;
  const line = linearRegression(
    otherX,
    y.filter((_, place) => place !== index),
  );
  const at = x[index] as number;
  const meanX = otherX.reduce((sum, value) => sum + value / otherX.length, 0);
  const variance = line.residualVariance * (1 + 1 / otherX.length + (at - meanX) ** 2 / line.sumOfSquares);
  const value = line.intercept + line.slope * at;
  const halfWidth = factor * Math.sqrt(variance);
  return { value, low: value - halfWidth, high: value + halfWidth };
}
