import type { SeriesView } from '#lib/schemas/reading.ts';

/** A column of a series that may have gaps; empty when the engine did not make it. */
export function gapColumn(series: SeriesView, name: string): readonly (number | null)[] {
  return series.columns[name] ?? [];
}

/** A column that has no gaps: times, frequencies, orders. */
export function fullColumn(series: SeriesView, name: string): readonly number[] {
  return gapColumn(series, name).filter((value) => value !== null);
}
