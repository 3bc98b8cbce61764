import { useCallback, useMemo } from 'react';
import type uPlot from 'uplot';
import { numberText } from '#lib/format/numberText.ts';
import type { ChartColours } from './chartColours.ts';
import type { PlotOptions } from './createPlot.ts';
import { LinePlot } from './LinePlot.tsx';
import { basePlotOptions, PLOT_LEFT_PX, PLOT_RIGHT_PX } from './plotStyle.ts';

interface Props {
  readonly title: string;
  readonly fileName: string;
  /** Ascending in [0, 1), shape [pointCount]. */
  readonly turnFraction: readonly number[];
  /** Mean 1, dimensionless, shape [pointCount]. */
  readonly level: readonly (number | null)[];
  /** Sound events in one turn; each stands on its part of the unrolled ring. */
  readonly eventsPerTurn: number;
}

const HEIGHT_PX = 220;
const MOST_PARTS = 60;
const PER_CENT = 100;
/** 15°, 30°, 45°, 60° and 90°. */
const TURN_STEPS = [24, 12, 8, 6, 4].map((parts) => 1 / parts);
const WHOLE_TURN = { from: 0, to: 1 };

/** The sound of one turn, averaged over all turns, above the unrolled ring. */
export function OneTurnChart({ title, fileName, turnFraction, level, eventsPerTurn }: Props) {
  const data = useMemo(
    (): uPlot.AlignedData => [
      [...turnFraction, 1],
      [...level, level[0] ?? null],
    ],
    [turnFraction, level],
  );
  const optionsOf = useCallback((colours: ChartColours) => oneTurnOptions(colours), []);
  return (
    <LinePlot
      title={title}
      fileName={fileName}
      xLabel="One turn of the shaft"
      yLabel="Loudness, 1 is the mean of the turn"
      heightPx={HEIGHT_PX}
      data={data}
      columns={[
        { label: 'turn', unit: '', decimals: 4, values: turnFraction },
        { label: 'level', unit: '', decimals: 4, values: level },
      ]}
      home={WHOLE_TURN}
      optionsOf={optionsOf}
      hint="Point, touch or use the arrow keys to read a value; drag to look closer."
      readOutOf={(row) =>
        `${numberText((turnFraction[row] ?? 1) * 360, 0)}° of the turn: ${numberText(level[row] ?? level[0] ?? 0, 2)} times the mean`
      }
      below={(range) => <UnrolledRing eventsPerTurn={eventsPerTurn} from={range.from} to={range.to} />}
    />
  );
}

function UnrolledRing({ eventsPerTurn, from, to }: { eventsPerTurn: number; from: number; to: number }) {
  if (!Number.isInteger(eventsPerTurn) || eventsPerTurn > MOST_PARTS) return null;
  const percent = (turn: number) => ((turn - from) / (to - from)) * PER_CENT;
  return (
    <div style={{ paddingLeft: `${String(PLOT_LEFT_PX)}px`, paddingRight: `${String(PLOT_RIGHT_PX)}px` }}>
      <svg width="100%" height="24" className="block overflow-hidden" aria-hidden="true">
        {Array.from({ length: eventsPerTurn }, (_, part) => (
          <rect
            key={part}
            x={`${percent((part + 0.06) / eventsPerTurn).toFixed(3)}%`}
            width={`${(percent((part + 0.94) / eventsPerTurn) - percent((part + 0.06) / eventsPerTurn)).toFixed(3)}%`}
            y="4"
            height="12"
            className="fill-ink"
          />
        ))}
      </svg>
    </div>
  );
}

function oneTurnOptions(colours: ChartColours): PlotOptions {
  const base = basePlotOptions(colours);
  const [horizontal, vertical] = base.axes ?? [];
  return {
    ...base,
    axes: [
      {
        ...horizontal,
        incrs: TURN_STEPS,
        values: (_, turns) => turns.map((turn) => `${String(Math.round(turn * 360))}°`),
      },
      vertical ?? {},
    ],
    series: [{}, { stroke: colours.ink, width: 1.5, points: { show: false } }],
  };
}
