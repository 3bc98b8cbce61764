import type uPlot from 'uplot';
import type { RefObject } from 'react';
import { csvOfRange, type ChartColumn } from './chartColumns.ts';
import { showRange, wholeRangeOf } from './createPlot.ts';
import { zoomedRange, type PlotRange } from './plotRange.ts';
import { saveChartPicture, saveText } from './saveChart.ts';

interface Props {
  readonly title: string;
  readonly fileName: string;
  readonly yLabel: string;
  readonly xLabel: string;
  readonly columns: readonly ChartColumn[];
  readonly plot: RefObject<uPlot | null>;
  readonly range: PlotRange;
  readonly home: PlotRange;
  readonly isTableShown: boolean;
  readonly onTable: () => void;
}

const ZOOM_STEP = 1.6;
const WORD = 'touch px-2 underline underline-offset-4 hover:decoration-2';

/** Zoom with its way back, files of the shown range, and the table: words, not icons. */
export function ChartTools(props: Props) {
  const { plot, range, home, columns, fileName, isTableShown } = props;
  const zoom = (factor: number) => {
    if (!plot.current) return;
    const middle = (range.from + range.to) / 2;
    showRange(plot.current, zoomedRange(range, wholeRangeOf(plot.current), factor, middle));
  };
  const isAtHome = range.from === home.from && range.to === home.to;
  const savePicture = () => {
    const canvas = plot.current?.ctx.canvas;
    if (canvas) saveChartPicture(canvas, { ...props, fileName: `${fileName}.png` });
  };
  return (
    <div className="-ml-2 flex flex-wrap text-small print:hidden" role="group" aria-label={`Tools for ${props.title}`}>
      <Word
        onPress={() => {
          zoom(1 / ZOOM_STEP);
        }}
      >
        Closer
      </Word>
      <Word
        onPress={() => {
          zoom(ZOOM_STEP);
        }}
      >
        Wider
      </Word>
      {!isAtHome && (
        <Word
          onPress={() => {
            if (plot.current) showRange(plot.current, home);
          }}
        >
          Back to the first view
        </Word>
      )}
      <Word onPress={savePicture}>PNG</Word>
      <Word
        onPress={() => {
          saveText(csvOfRange(columns, range), `${fileName}.csv`, 'text/csv');
        }}
      >
        CSV
      </Word>
      <button type="button" className={WORD} aria-expanded={isTableShown} onClick={props.onTable}>
        {isTableShown ? 'Hide the table' : 'Table'}
      </button>
    </div>
  );
}

function Word({ onPress, children }: { readonly onPress: () => void; readonly children: string }) {
  return (
    <button type="button" className={WORD} onClick={onPress}>
      {children}
    </button>
  );
}
