/**
 * A number as people read it: fixed decimals, a true minus sign, no grouping (the interface groups by a margin).
 *
 * @param value any finite number
 * @param decimals digits behind the mark, integer in [0, 20]
 * @returns plain text, for example `−12.50`; a value that rounds to zero has no sign
 * @throws {RangeError} when `value` is not finite
 * @example numberText(-12.5, 2) // '−12.50'
 */
export function numberText(value: number, decimals: number): string {
  if (!Number.isFinite(value)) throw new RangeError(`numberText: value must be finite, got ${String(value)}`);
  const digits = Math.abs(value).toFixed(decimals);
  return value < 0 && Number(digits) !== 0 ? `−${digits}` : digits;
}

/**
 * A number as someone typed it: no more decimals than it has.
 *
 * @example plainNumberText(6) // '6'
 * @example plainNumberText(-0.25) // '−0.25'
 */
export function plainNumberText(value: number): string {
  return String(value).replace('-', '−');
}
