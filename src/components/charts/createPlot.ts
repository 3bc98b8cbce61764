import uPlot from 'uplot';
import { chartColours, type ChartColours } from './chartColours.ts';
import { listenToGestures } from './plotGestures.ts';
import { wholeRange, type PlotRange } from './plotRange.ts';

export type PlotOptions = Omit<uPlot.Options, 'width' | 'height'>;

export interface PlotInput {
  /** First column ascending; null is a gap. */
  readonly columns: uPlot.AlignedData;
  readonly heightPx: number;
  /** What is shown first. */
  readonly range: PlotRange;
  readonly optionsOf: (colours: ChartColours) => PlotOptions;
  readonly onRange: (range: PlotRange) => void;
  /** The row under the pointer, finger or key; null when there is none. */
  readonly onRow: (row: number | null) => void;
  /** A press that was no drag, as a place on the horizontal axis. */
  readonly onPick: (position: number) => void;
}

const EMPTY_WIDTH_PX = 320;
/** A press that moves further is a drag. */
const MOST_WOBBLE_PX = 4;

/** Draws a uPlot into an element with its gestures; the returned function takes all of it away. */
export function createPlot(parent: HTMLElement, input: PlotInput): { plot: uPlot; remove: () => void } {
  const options = input.optionsOf(chartColours(parent));
  const plot = new uPlot(
    {
      ...options,
      width: parent.clientWidth || EMPTY_WIDTH_PX,
      height: input.heightPx,
      scales: { ...options.scales, x: { time: false, min: input.range.from, max: input.range.to } },
      hooks: {
        ...options.hooks,
        setScale: [
          (self, key) => {
            if (key === 'x') input.onRange(rangeOf(self));
          },
        ],
        setCursor: [
          ({ cursor }) => {
            const isAway = cursor.left === undefined || cursor.left < 0;
            input.onRow(isAway ? null : (cursor.idx ?? null));
          },
        ],
      },
    },
    input.columns,
    parent,
  );
  const stops = [keepWidth(plot, parent), listenToPicks(plot, input.onPick), listenToPlotGestures(plot, parent)];
  return {
    plot,
    remove: () => {
      for (const stop of stops) stop();
      plot.destroy();
    },
  };
}

/** The stretch of the horizontal axis that a plot shows. */
export function rangeOf({ scales }: uPlot): PlotRange {
  return { from: scales.x?.min ?? 0, to: scales.x?.max ?? 1 };
}

/** Shows a stretch of the horizontal axis. */
export function showRange(plot: uPlot, { from, to }: PlotRange): void {
  plot.setScale('x', { min: from, max: to });
}

/** Everything that the plot could show. */
export function wholeRangeOf(plot: uPlot): PlotRange {
  return wholeRange(plot.data[0]);
}

function listenToPlotGestures(plot: uPlot, parent: HTMLElement): () => void {
  return listenToGestures(plot.over, {
    hasFocus: () => parent.contains(document.activeElement),
    range: () => rangeOf(plot),
    whole: () => wholeRangeOf(plot),
    positionAt: (clientX) => positionAt(plot, clientX),
    onRange: (range) => {
      showRange(plot, range);
    },
    onPoint: (clientX, clientY) => {
      const area = plot.over.getBoundingClientRect();
      plot.setCursor({ left: clientX - area.left, top: clientY - area.top });
    },
  });
}

function positionAt(plot: uPlot, clientX: number): number {
  return plot.posToVal(clientX - plot.over.getBoundingClientRect().left, 'x');
}

function keepWidth(plot: uPlot, parent: HTMLElement): () => void {
  const observer = new ResizeObserver(() => {
    const width = parent.clientWidth;
    if (width > 0 && width !== plot.width) plot.setSize({ width, height: plot.height });
  });
  observer.observe(parent);
  return () => {
    observer.disconnect();
  };
}

function listenToPicks(plot: uPlot, onPick: (position: number) => void): () => void {
  const stop = new AbortController();
  let pressedAt: number | null = null;
  plot.over.addEventListener('pointerdown', ({ clientX }) => (pressedAt = clientX), { signal: stop.signal });
  plot.over.addEventListener(
    'pointerup',
    ({ clientX }) => {
      const isPick = pressedAt !== null && Math.abs(clientX - pressedAt) < MOST_WOBBLE_PX;
      pressedAt = null;
      if (isPick) onPick(positionAt(plot, clientX));
    },
    { signal: stop.signal },
  );
  return () => {
    stop.abort();
  };
}
