import type { KeyboardEvent } from 'react';
import type uPlot from 'uplot';
import { highestRow } from './chartColumns.ts';
import { rangeOf, showRange, wholeRangeOf } from './createPlot.ts';
import { firstIndexFrom, movedRange, zoomedRange, type PlotRange } from './plotRange.ts';

/** An arrow key moves by this fraction of the shown stretch, with Shift by one row. */
const STEP_FRACTION = 1 / 100;
const ZOOM_STEP = 1.6;

/**
 * Reads and zooms a chart by keys: arrows move the read-out (Shift: one row), Home and End go to the ends, + and −
 * zoom about the read-out, Escape goes back to the first view, Enter picks.
 *
 * @returns whether the key meant something here
 */
export function pressChartKey(
  plot: uPlot,
  event: KeyboardEvent,
  { row, home, onPick }: { row: number | null; home: PlotRange; onPick?: ((position: number) => void) | undefined },
): boolean {
  const positions = plot.data[0];
  const range = rangeOf(plot);
  const first = firstIndexFrom(positions, range.from);
  const last = Math.max(first, firstIndexFrom(positions, range.to) - 1);
  const current = row ?? (first + last) >> 1;
  const about = positions[current] ?? range.from;
  const zoom = (factor: number) => {
    showRange(plot, zoomedRange(range, wholeRangeOf(plot), factor, about));
  };
  const actions: Record<string, () => void> = {
    ArrowRight: () => {
      readRow(plot, nextRow(plot, current, 1, event.shiftKey));
    },
    ArrowLeft: () => {
      readRow(plot, nextRow(plot, current, -1, event.shiftKey));
    },
    Home: () => {
      readRow(plot, first);
    },
    End: () => {
      readRow(plot, last);
    },
    '+': () => {
      zoom(1 / ZOOM_STEP);
    },
    '-': () => {
      zoom(ZOOM_STEP);
    },
    Escape: () => {
      showRange(plot, home);
    },
    Enter: () => onPick?.(about),
  };
  const action = actions[event.key === '=' ? '+' : event.key];
  action?.();
  return action !== undefined;
}

/** The row one step further; of the rows that a step passes, the highest, so that no peak is jumped over. */
function nextRow(plot: uPlot, current: number, direction: 1 | -1, isSingle: boolean): number {
  const positions = plot.data[0];
  const last = positions.length - 1;
  const { from, to } = rangeOf(plot);
  const target = (positions[current] ?? from) + direction * (to - from) * STEP_FRACTION;
  const jumped = firstIndexFrom(positions, target);
  const single = current + direction;
  if (isSingle || (direction > 0 ? jumped <= single : jumped >= single)) return Math.min(last, Math.max(0, single));
  const passed = Array.from({ length: Math.abs(jumped - current) }, (_, step) => current + direction * (step + 1));
  return highestRow(
    plot.data[1] as (number | null)[],
    passed.filter((index) => index >= 0 && index <= last),
  );
}

function readRow(plot: uPlot, row: number) {
  const position = plot.data[0][row];
  if (position === undefined) return;
  const { from, to } = rangeOf(plot);
  if (position < from || position > to) {
    showRange(plot, movedRange({ from, to }, wholeRangeOf(plot), position < from ? position - from : position - to));
  }
  plot.setCursor({ left: plot.valToPos(position, 'x'), top: 0 });
}
