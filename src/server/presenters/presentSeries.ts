import type { Series } from '#lib/analysis/series.ts';
import type { SeriesView } from '#lib/schemas/reading.ts';

/** As many digits as a 32-bit float carries; more would be noise, and would double the size of the answer. */
const FLOAT32_DIGITS = 7;

/** Numbers as JSON can say them: a gap is null. */
export function presentSeries({ name, columns }: Series): SeriesView {
  return {
    name,
    columns: Object.fromEntries(columns.map((column) => [column.name, Array.from(column.values, presentValue)])),
    units: Object.fromEntries(columns.map((column) => [column.name, column.unit])),
  };
}

function presentValue(value: number): number | null {
  return Number.isFinite(value) ? Number(value.toPrecision(FLOAT32_DIGITS)) : null;
}
