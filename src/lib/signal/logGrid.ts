/** Cells of the logarithmic frequency grid per octave: 0.58 % each, finer than any short spectrum resolves. */
export const CELLS_PER_OCTAVE = 120;

/** Frequency of cell 0: one event in five seconds. */
const LOWEST_CELL_HZ = 0.2;

/** Centre of a cell, Hz; cells may be fractional. @example hertzOfCell(120) // 0.4 */
export function hertzOfCell(cell: number): number {
  return LOWEST_CELL_HZ * 2 ** (cell / CELLS_PER_OCTAVE);
}

/** The cell nearest to a frequency, clamped to ≥ 0. @example cellOfHertz(0.4) // 120 */
export function cellOfHertz(frequencyHz: number): number {
  return Math.max(0, Math.round(CELLS_PER_OCTAVE * Math.log2(frequencyHz / LOWEST_CELL_HZ)));
}

/** Whole cells between a frequency and its multiple by `ratio`. @example cellShift(2) // 120 */
export function cellShift(ratio: number): number {
  return Math.round(CELLS_PER_OCTAVE * Math.log2(ratio));
}
