import { chiSquareQuantile } from './chiSquare.ts';
import { CONFIDENCE_LEVEL, type Interval } from './interval.ts';
import { studentTQuantile } from './studentT.ts';

/** Mean and spread of values that scatter normally. */
export interface NormalSample {
  readonly mean: Interval;
  /** Standard deviation of the population that the values come from. */
  readonly standardDeviation: Interval;
}

/**
 * What a few repeated measurements say about the quantity and about their scatter.
 *
 * @param values shape [n], n ≥ 2, finite
 * @returns both with their 95 % intervals: Student's t for the mean, chi-square for the standard deviation
 * @throws {RangeError} for fewer than two values
 * @example normalSample([99, 100, 101]).mean.value // 100
 * Reference: NIST/SEMATECH e-Handbook of statistical methods, 1.3.5.2 and 7.2.3.1. Two passes, because one-pass
 * sums lose all digits where the spread is small against the mean.
 */
export function normalSample(values: readonly number[]): NormalSample {
  const count = values.length;
  if (count < 2) throw new RangeError(`normalSample: values must hold at least 2, got ${count}`);
  const roughMean = values.reduce((sum, value) => sum + value / count, 0);
  const mean = roughMean + values.reduce((sum, value) => sum + (value - roughMean) / count, 0);
  const squares = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  const degreesOfFreedom = count - 1;
  const deviation = Math.sqrt(squares / degreesOfFreedom);
  const meanHalfWidth = (studentTQuantile(CONFIDENCE_LEVEL, degreesOfFreedom) * deviation) / Math.sqrt(count);
  const tail = (1 - CONFIDENCE_LEVEL) / 2;
  return {
    mean: {
      value: mean,
      low: mean - meanHalfWidth,
      high: mean + meanHalfWidth,
    },
    standardDeviation: {
      value: deviation,
      low: Math.sqrt(squares / chiSquareQuantile(1 - tail, degreesOfFreedom)),
      high: Math.sqrt(squares / chiSquareQuantile(tail, degreesOfFreedom)),
    },
  };
}
