import { columnHeading, tableRows, type ChartColumn } from './chartColumns.ts';
import type { PlotRange } from './plotRange.ts';

interface Props {
  readonly caption: string;
  readonly columns: readonly ChartColumn[];
  readonly range: PlotRange;
}

/** The shown range as a table. Of more rows than anyone reads, each stretch gives its highest. */
export function ColumnTable({ caption, columns, range }: Props) {
  return (
    // What scrolls must be reachable by keys.
    // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex -- scrolling is the interaction
    <div className="max-h-80 overflow-auto" tabIndex={0} role="region" aria-label={`${caption}, as a table`}>
      <table className="figures text-small">
        <caption className="sr-only">{caption}</caption>
        <thead className="sticky top-0 bg-sheet">
          <tr>
            {columns.map((column) => (
              <th key={column.label} scope="col" className="px-3 py-1 text-end font-sans">
                {columnHeading(column)}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {tableRows(columns, range).map((row) => (
            <tr key={row} className="border-t border-line">
              {columns.map(({ label, values, decimals }) => (
                <td key={label} className="px-3 py-1 text-end">
                  {values[row]?.toFixed(decimals).replace('-', '−') ?? 'gap'}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
