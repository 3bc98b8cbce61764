/** A stretch of a chart's horizontal axis, in that axis' unit; `from` < `to`. */
export interface PlotRange {
  readonly from: number;
  readonly to: number;
}

/** A shown stretch is never smaller than this fraction of everything. */
const SMALLEST_FRACTION = 0.002;

/** The whole stretch of ascending positions. */
export function wholeRange(positions: ArrayLike<number>): PlotRange {
  const from = positions[0] ?? 0;
  const to = positions[positions.length - 1] ?? 1;
  return to > from ? { from, to } : { from: from - 1 / 2, to: from + 1 / 2 };
}

/** The range stretched by a factor about a fixed place, kept inside `whole`. A factor below 1 shows less. */
export function zoomedRange(range: PlotRange, whole: PlotRange, factor: number, about: number): PlotRange {
  const full = whole.to - whole.from;
  const width = Math.min(full, Math.max(full * SMALLEST_FRACTION, (range.to - range.from) * factor));
  const share = (about - range.from) / (range.to - range.from);
  return shiftedInto({ from: about - share * width, to: about + (1 - share) * width }, whole);
}

/** The range moved along by a distance, kept inside `whole`. */
export function movedRange(range: PlotRange, whole: PlotRange, distance: number): PlotRange {
  return shiftedInto({ from: range.from + distance, to: range.to + distance }, whole);
}

/** Index of the first position ≥ `value` in ascending positions; their count when there is none. */
export function firstIndexFrom(positions: ArrayLike<number>, value: number): number {
  let low = 0;
  let high = positions.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((positions[middle] ?? Infinity) < value) low = middle + 1;
    else high = middle;
  }
  return low;
}

function shiftedInto(range: PlotRange, whole: PlotRange): PlotRange {
  const shift = Math.max(0, whole.from - range.from) - Math.max(0, range.to - whole.to);
  return { from: Math.max(whole.from, range.from + shift), to: Math.min(whole.to, range.to + shift) };
}
