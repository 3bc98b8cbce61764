import { useCallback, useMemo } from 'react';
import type uPlot from 'uplot';
import { numberText } from '#lib/format/numberText.ts';
import type { ChartColours } from './chartColours.ts';
import type { PlotOptions } from './createPlot.ts';
import { LinePlot } from './LinePlot.tsx';
import { basePlotOptions } from './plotStyle.ts';
import { wholeRange, type PlotRange } from './plotRange.ts';
import { Rack } from './Rack.tsx';
import { teethOver } from './teeth.ts';

interface Props {
  readonly title: string;
  readonly fileName: string;
  /** Ascending, Hz or multiples of the shaft rate, shape [rowCount]. */
  readonly positions: readonly number[];
  readonly positionUnit: 'Hz' | 'orders';
  /** dB above the local floor, shape [rowCount]; null is a gap. */
  readonly levelDecibels: readonly (number | null)[];
  /** Distance of the teeth of the rack in `positionUnit`; null draws no rack. */
  readonly toothSpacing: number | null;
  /** The first view shows the teeth of this spacing, so that moving the rack does not move the view. */
  readonly homeSpacing: number | null;
  readonly isAnswer: boolean;
  readonly markedTeeth: readonly number[] | null;
  readonly rackMeaning: string;
  readonly onToothSpacing?: (spacing: number) => void;
}

const HEIGHT_PX = 320;
const TEETH_IN_FIRST_VIEW = 8.6;
const LEAST_TOP_DECIBELS = 20;
const BOTTOM_DECIBELS = -6;
const HEADROOM = 1.08;
const LABELS = {
  Hz: { name: 'frequency', axis: 'Frequency, Hz', decimals: 1 },
  orders: { name: 'order', axis: 'Order: multiples of the turning rate', decimals: 2 },
} as const;

/** A spectrum with the rack above it. */
export function SpectrumChart(props: Props) {
  const { positions, positionUnit, levelDecibels, toothSpacing, homeSpacing } = props;
  const label = LABELS[positionUnit];
  const data = useMemo((): uPlot.AlignedData => [[...positions], [...levelDecibels]], [positions, levelDecibels]);
  const home = useMemo(() => firstView(positions, homeSpacing), [positions, homeSpacing]);
  const teeth = useMemo(
    () => (toothSpacing === null ? [] : teethOver(positions, levelDecibels, toothSpacing)),
    [positions, levelDecibels, toothSpacing],
  );
  const optionsOf = useCallback((colours: ChartColours) => spectrumOptions(colours), []);
  return (
    <LinePlot
      title={props.title}
      fileName={props.fileName}
      xLabel={label.axis}
      yLabel="Level above the floor, dB"
      heightPx={HEIGHT_PX}
      data={data}
      columns={[
        { label: label.name, unit: positionUnit === 'Hz' ? 'Hz' : '', decimals: label.decimals, values: positions },
        { label: 'level above the floor', unit: 'dB', decimals: 1, values: levelDecibels },
      ]}
      home={home}
      optionsOf={optionsOf}
      hint="Point, touch or use the arrow keys to read a value; drag to look closer."
      readOutOf={(row) => readOut(positions[row], levelDecibels[row], positionUnit)}
      above={(range) =>
        toothSpacing !== null && (
          <Rack
            teeth={teeth}
            spacing={toothSpacing}
            range={range}
            isAnswer={props.isAnswer}
            marked={props.markedTeeth}
            meaning={props.rackMeaning}
            onSpacing={props.onToothSpacing}
          />
        )
      }
    />
  );
}

function firstView(positions: readonly number[], spacing: number | null): PlotRange {
  const whole = wholeRange(positions);
  return spacing === null ? whole : { from: 0, to: Math.min(whole.to, spacing * TEETH_IN_FIRST_VIEW) };
}

function readOut(position: number | undefined, level: number | null | undefined, unit: 'Hz' | 'orders'): string {
  if (position === undefined) return '';
  const place = unit === 'Hz' ? `${numberText(position, 1)} Hz` : `order ${numberText(position, 2)}`;
  return level == null ? `${place}: nothing` : `${place}: ${numberText(level, 1)} dB above the floor`;
}

function spectrumOptions(colours: ChartColours): PlotOptions {
  return {
    ...basePlotOptions(colours),
    scales: {
      y: { range: (_, __, highest) => [BOTTOM_DECIBELS, Math.max(LEAST_TOP_DECIBELS, highest * HEADROOM)] },
    },
    series: [{}, { stroke: colours.ink, width: 1, points: { show: false } }],
  };
}
