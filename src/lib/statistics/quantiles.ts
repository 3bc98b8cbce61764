/**
 * Quantile of values by linear interpolation between order statistics.
 *
 * @param values any order, finite, at least one; not written
 * @param probability [0, 1]
 * @returns the value at position (n − 1)·probability of the sorted values; NaN when there are none
 * @example quantile([1, 2, 3, 4], 0.5) // 2.5
 * Reference: R. Hyndman & Y. Fan (1996), Sample quantiles in statistical packages, The American Statistician 50(4), definition 7.
 */
export function quantile(values: ArrayLike<number>, probability: number): number {
  return quantileOfSorted(Float64Array.from(values).sort(), probability);
}

/** The same for values that are already in ascending order. */
export function quantileOfSorted(sorted: Float64Array, probability: number): number {
  const position = (sorted.length - 1) * probability;
  const left = Math.floor(position);
  const here = sorted[left] ?? Number.NaN;
  return here + (position - left) * ((sorted[left + 1] ?? here) - here);
}

/** Middle of values: half lie below. NaN when there are none. @example median([3, 1, 2]) // 2 */
export function median(values: ArrayLike<number>): number {
  return quantile(values, 0.5);
}

/** Makes the median absolute deviation estimate the standard deviation of normal values: 1 / Φ⁻¹(¾). */
const NORMAL_CONSISTENCY = 1.4826;

/**
 * Standard deviation of the bulk of values, unmoved by outliers up to half of them.
 *
 * @example robustSpread([1, 2, 3]) // 1.4826
 * Reference: F. Hampel (1974), The influence curve and its role in robust estimation, JASA 69.
 */
export function robustSpread(values: ArrayLike<number>): number {
  const middle = median(values);
  return NORMAL_CONSISTENCY * median(Float64Array.from(values, (value) => Math.abs(value - middle)));
}
