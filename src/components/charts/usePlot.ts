import { useEffect, useRef, useState, type RefObject } from 'react';
import type uPlot from 'uplot';
import { createPlot, showRange, type PlotInput } from './createPlot.ts';
import type { PlotRange } from './plotRange.ts';
import { useColourScheme } from './useColourScheme.ts';

interface UsePlotInput extends Pick<PlotInput, 'columns' | 'heightPx' | 'optionsOf'> {
  /** What is shown first and after "back". */
  readonly home: PlotRange;
  readonly onPick?: ((position: number) => void) | undefined;
}

interface PlotState {
  readonly box: RefObject<HTMLDivElement | null>;
  readonly plot: RefObject<uPlot | null>;
  readonly range: PlotRange;
  /** Row of the read-out. */
  readonly row: number | null;
}

/**
 * A uPlot in a div. It is made anew for other columns, options or colours and keeps its stretch of the axis; another
 * home moves it there. `columns` and `optionsOf` must keep their identity between renders.
 */
export function usePlot({ columns, heightPx, home, optionsOf, onPick }: UsePlotInput): PlotState {
  const box = useRef<HTMLDivElement>(null);
  const plot = useRef<uPlot>(null);
  const pick = useRef(onPick);
  const shown = useRef(home);
  const [range, setRange] = useState(home);
  const [row, setRow] = useState<number | null>(null);
  const scheme = useColourScheme();

  useEffect(() => {
    pick.current = onPick;
  }, [onPick]);

  useEffect(() => {
    shown.current = { from: home.from, to: home.to };
    if (plot.current) showRange(plot.current, shown.current);
    else setRange(shown.current);
  }, [home.from, home.to]);

  useEffect(() => {
    if (box.current === null) return undefined;
    const made = createPlot(box.current, {
      columns,
      heightPx,
      optionsOf,
      range: shown.current,
      onRow: setRow,
      onRange: (next) => {
        shown.current = next;
        setRange(next);
      },
      onPick: (position) => pick.current?.(position),
    });
    plot.current = made.plot;
    return () => {
      plot.current = null;
      made.remove();
    };
  }, [columns, heightPx, optionsOf, scheme]);

  return { box, plot, range, row };
}
