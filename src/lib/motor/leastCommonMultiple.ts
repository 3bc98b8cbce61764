function greatestCommonDivisor(a: number, b: number): number {
  return b === 0 ? a : greatestCommonDivisor(b, a % b);
}

/**
 * Least common multiple of two positive integers.
 *
 * @throws {RangeError} when either is not a positive integer
 * @example leastCommonMultiple(4, 6) // 12
 */
export function leastCommonMultiple(a: number, b: number): number {
  for (const value of [a, b]) {
    if (!Number.isInteger(value) || value < 1) {
      throw new RangeError(`leastCommonMultiple: both numbers must be positive integers, got ${value}`);
    }
  }
  return (a / greatestCommonDivisor(a, b)) * b;
}
