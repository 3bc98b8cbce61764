import 'uplot/dist/uPlot.min.css';
import { useId, useState, type ReactNode } from 'react';
import type uPlot from 'uplot';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import type { ChartColumn } from './chartColumns.ts';
import { pressChartKey } from './chartKeys.ts';
import { ChartTools } from './ChartTools.tsx';
import { ColumnTable } from './ColumnTable.tsx';
import type { PlotOptions } from './createPlot.ts';
import type { ChartColours } from './chartColours.ts';
import type { PlotRange } from './plotRange.ts';
import { usePlot } from './usePlot.ts';

interface Props {
  readonly title: string;
  /** Without extension. */
  readonly fileName: string;
  readonly xLabel: string;
  readonly yLabel: string;
  readonly heightPx: number;
  /** What uPlot draws; keep its identity. */
  readonly data: uPlot.AlignedData;
  /** The same as people read it, in files and in the table. */
  readonly columns: readonly ChartColumn[];
  readonly home: PlotRange;
  readonly optionsOf: (colours: ChartColours) => PlotOptions;
  /** The read-out of one row in words. */
  readonly readOutOf: (row: number) => string;
  /** What to do with the chart, shown while nothing is read out. */
  readonly hint: string;
  readonly onPick?: (position: number) => void;
  /** Drawn above and below the plot, aligned with it. */
  readonly above?: (range: PlotRange) => ReactNode;
  readonly below?: (range: PlotRange) => ReactNode;
}

/** One chart: names of the axes, plot, read-out, tools, table. */
export function LinePlot(props: Props) {
  const { title, data, columns, home, heightPx, optionsOf, onPick, readOutOf, xLabel, yLabel } = props;
  const { box, plot, range, row } = usePlot({ columns: data, heightPx, home, optionsOf, onPick });
  const [isTableShown, setIsTableShown] = useState(false);
  const titleId = useId();
  const readOut = row === null ? null : readOutOf(row);
  return (
    <figure aria-labelledby={titleId} className="min-w-0">
      <figcaption id={titleId} className="sr-only">
        {title}
      </figcaption>
      {props.above?.(range)}
      <p className="text-small text-muted">{yLabel}</p>
      {/* A slider over the rows: the one pattern in which arrow keys read values to every screen reader. */}
      <div
        role="slider"
        tabIndex={0}
        aria-label={`Read ${title}`}
        aria-valuemin={0}
        aria-valuemax={data[0].length - 1}
        aria-valuenow={row ?? 0}
        aria-valuetext={readOut ?? props.hint}
        onKeyDown={(event) => {
          if (plot.current && pressChartKey(plot.current, event, { row, home, onPick })) event.preventDefault();
        }}
        className={`-outline-offset-2 ${onPick === undefined ? 'cursor-crosshair' : 'cursor-pointer'}`}
      >
        <div ref={box} className="overflow-hidden" style={{ height: `${String(heightPx)}px` }} />
      </div>
      {props.below?.(range)}
      <div className="flex flex-wrap justify-between gap-x-4 text-small">
        <p className={readOut === null ? 'text-muted print:hidden' : ''}>
          <GroupedText text={readOut ?? props.hint} />
        </p>
        <p className="text-muted">{xLabel}</p>
      </div>
      <ChartTools
        {...{ title, fileName: props.fileName, yLabel, xLabel, columns, plot, range, home, isTableShown }}
        onTable={() => {
          setIsTableShown(!isTableShown);
        }}
      />
      {isTableShown && <ColumnTable caption={title} columns={columns} range={range} />}
    </figure>
  );
}
