import { firstIndexFrom, type PlotRange } from './plotRange.ts';

/** One column of a chart as files and tables show it. */
export interface ChartColumn {
  /** Name for people: "frequency". */
  readonly label: string;
  /** Unit as people write it; empty for a plain number. */
  readonly unit: string;
  /** Plain digits behind the decimal mark in files and tables. */
  readonly decimals: number;
  /** null marks a gap. */
  readonly values: readonly (number | null)[];
}

/** Most rows of the table beside a chart; the file has them all. */
const MOST_TABLE_ROWS = 60;

/** Heading of a column: name and unit. */
export function columnHeading({ label, unit }: ChartColumn): string {
  return unit === '' ? label : `${label}, ${unit}`;
}

/** CSV (RFC 4180) of the rows whose first column lies in the range: decimal point, no grouping, empty for a gap. */
export function csvOfRange(columns: readonly ChartColumn[], range: PlotRange): string {
  const rows = rowsOfRange(columns, range);
  const lines = [
    columns.map((column) => `"${columnHeading(column)}"`),
    ...rows.map((row) =>
      columns.map(({ values, decimals }) => {
        const value = values[row] ?? null;
        return value === null ? '' : value.toFixed(decimals);
      }),
    ),
  ];
  return lines.map((line) => `${line.join(',')}\r\n`).join('');
}

/** Rows for the table: all of them, or of each stretch the one in which the second column is highest. */
export function tableRows(columns: readonly ChartColumn[], range: PlotRange): number[] {
  const rows = rowsOfRange(columns, range);
  if (rows.length <= MOST_TABLE_ROWS) return rows;
  const values = columns[1]?.values ?? [];
  return Array.from({ length: MOST_TABLE_ROWS }, (_, part) => {
    const from = Math.floor((part * rows.length) / MOST_TABLE_ROWS);
    const to = Math.floor(((part + 1) * rows.length) / MOST_TABLE_ROWS);
    return highestRow(values, rows.slice(from, to));
  });
}

/** Of the given rows the one with the highest value; the first when all are gaps. */
export function highestRow(values: readonly (number | null)[], rows: readonly number[]): number {
  let best = rows[0] ?? 0;
  for (const row of rows) {
    if ((values[row] ?? -Infinity) > (values[best] ?? -Infinity)) best = row;
  }
  return best;
}

function rowsOfRange(columns: readonly ChartColumn[], { from, to }: PlotRange): number[] {
  const positions = (columns[0]?.values ?? []).map((value) => value ?? Number.NaN);
  const first = firstIndexFrom(positions, from);
  const rows: number[] = [];
  for (let row = first; row < positions.length && (positions[row] ?? Infinity) <= to; row++) rows.push(row);
  return rows;
}
