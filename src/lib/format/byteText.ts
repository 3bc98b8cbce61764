import { numberText } from './numberText.ts';

const BYTES_PER_KILOBYTE = 1000;
const BYTES_PER_MEGABYTE = 1_000_000;
/** From here on a decimal tells nothing any more. */
const WHOLE_MEGABYTES_FROM_BYTES = 100_000_000;

/**
 * A number of bytes as people read it, in decimal units (IEC 80000-13: 1 MB = 10⁶ B).
 *
 * @param byteCount integer ≥ 0
 * @example byteText(12_400_000) // '12.4 MB'
 * @example byteText(1920) // '2 kB'
 */
export function byteText(byteCount: number): string {
  if (byteCount < BYTES_PER_KILOBYTE) return `${String(byteCount)} bytes`;
  if (byteCount < BYTES_PER_MEGABYTE) return `${numberText(byteCount / BYTES_PER_KILOBYTE, 0)} kB`;
  const decimals = byteCount < WHOLE_MEGABYTES_FROM_BYTES ? 1 : 0;
  return `${numberText(byteCount / BYTES_PER_MEGABYTE, decimals)} MB`;
}
