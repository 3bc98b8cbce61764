/** Parts per million in one. */
export const PARTS_PER_MILLION = 1e6;
/** Per cent in one. */
export const PER_CENT = 100;

/** A fraction from parts per million. @example fractionFromPpm(250) // 0.00025 */
export function fractionFromPpm(ppm: number): number {
  return ppm / PARTS_PER_MILLION;
}
