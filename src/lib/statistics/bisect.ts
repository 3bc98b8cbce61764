/** Halvings after which two doubles of one binade cannot lie further apart. */
const HALVING_COUNT = 60;

/**
 * Where a rising function crosses zero.
 *
 * @param rising monotonically non-decreasing on the bracket
 * @param low where it is at most 0
 * @param high where it is at least 0
 * @returns the crossing to (high − low) · 2⁻⁶⁰
 * @example bisect((x) => x * x - 2, 0, 2) // 1.4142135623730951
 * Reference: W. Press et al. (2007), Numerical recipes, section 9.1.1.
 */
export function bisect(rising: (x: number) => number, low: number, high: number): number {
  let left = low;
  let right = high;
  for (let halving = 0; halving < HALVING_COUNT; halving++) {
    const middle = (left + right) / 2;
    if (rising(middle) < 0) left = middle;
    else right = middle;
  }
  return (left + right) / 2;
}
