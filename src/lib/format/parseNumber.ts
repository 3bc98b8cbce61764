const PLAIN_DECIMAL = /^[+\-−]?\d+(?:[.,]\d+)?$/u;

/**
 * The number that a person typed: decimal point or decimal comma, no grouping, no exponent.
 *
 * @param text what stands in the box; white space around it is ignored
 * @returns the number; null for an empty box; NaN for anything else, so that the schema refuses it with the range
 * @example parseNumber('4,5') // 4.5
 * @example parseNumber('') // null
 */
export function parseNumber(text: string): number | null {
  const trimmed = text.trim();
  if (trimmed === '') return null;
  return PLAIN_DECIMAL.test(trimmed) ? Number(trimmed.replace(',', '.').replace('−', '-')) : Number.NaN;
}
