import { useCallback, useMemo } from 'react';
import type uPlot from 'uplot';
import { numberText } from '#lib/format/numberText.ts';
import { withOpacity, type ChartColours } from './chartColours.ts';
import type { PlotOptions } from './createPlot.ts';
import { LinePlot } from './LinePlot.tsx';
import { basePlotOptions, drawLabel } from './plotStyle.ts';
import { wholeRange } from './plotRange.ts';

interface Props {
  readonly title: string;
  readonly fileName: string;
  /** Ascending, shape [pointCount]. */
  readonly timeSeconds: readonly number[];
  /** null where nothing turns or is heard, shape [pointCount]. */
  readonly shaftSpeedRpm: readonly (number | null)[];
  readonly lowRpm: readonly (number | null)[];
  readonly highRpm: readonly (number | null)[];
  /** Someone points at a moment and wants to hear it. */
  readonly onHearFrom?: (timeSeconds: number) => void;
}

const HEIGHT_PX = 280;
const BAND_OPACITY = 0.18;
/** The speed axis spans at least this fraction of the speed, or a steady motor would look restless. */
const LEAST_SPAN_FRACTION = 0.04;
const MARGIN_FRACTION = 0.08;

/** Shaft speed over time with its 95 % band. */
export function TrendChart(props: Props) {
  const { timeSeconds, shaftSpeedRpm, lowRpm, highRpm } = props;
  const data = useMemo(
    (): uPlot.AlignedData => [[...timeSeconds], [...shaftSpeedRpm], [...lowRpm], [...highRpm]],
    [timeSeconds, shaftSpeedRpm, lowRpm, highRpm],
  );
  const home = useMemo(() => wholeRange(timeSeconds), [timeSeconds]);
  const optionsOf = useCallback((colours: ChartColours) => trendOptions(colours), []);
  const speed = { unit: 'rpm', decimals: 1 };
  return (
    <LinePlot
      title={props.title}
      fileName={props.fileName}
      xLabel="Time, s"
      yLabel="Shaft speed, rpm"
      heightPx={HEIGHT_PX}
      data={data}
      columns={[
        { label: 'time', unit: 's', decimals: 3, values: timeSeconds },
        { label: 'shaft speed', ...speed, values: shaftSpeedRpm },
        { label: 'low (95 %)', ...speed, values: lowRpm },
        { label: 'high (95 %)', ...speed, values: highRpm },
      ]}
      home={home}
      optionsOf={optionsOf}
      hint={
        props.onHearFrom === undefined
          ? 'Point, touch or use the arrow keys to read a value; drag to look closer.'
          : 'Click or press Enter to hear from there; drag to look closer.'
      }
      readOutOf={(row) => readOut(props, row)}
      {...(props.onHearFrom && { onPick: props.onHearFrom })}
    />
  );
}

function readOut({ timeSeconds, shaftSpeedRpm, lowRpm, highRpm }: Props, row: number): string {
  const moment = `At ${numberText(timeSeconds[row] ?? 0, 2)} s`;
  const speed = shaftSpeedRpm[row] ?? null;
  if (speed === null) return `${moment}: nothing turning heard`;
  const low = lowRpm[row] ?? null;
  const high = highRpm[row] ?? null;
  const between = low === null || high === null ? '' : `, between ${numberText(low, 0)} and ${numberText(high, 0)}`;
  return `${moment}: ${numberText(speed, 0)} rpm${between}`;
}

function trendOptions(colours: ChartColours): PlotOptions {
  const edge = { stroke: 'transparent', width: 0, points: { show: false } };
  const isolated = { show: (plot: uPlot, index: number) => hasLonePoints(plot.data[index] ?? []), size: 5 };
  return {
    ...basePlotOptions(colours),
    scales: { y: { range: (_, low, high) => speedSpan(low, high) } },
    series: [{}, { stroke: colours.copper, width: 1.75, points: { ...isolated, fill: colours.copper } }, edge, edge],
    bands: [{ series: [3, 2], fill: withOpacity(colours.copper, BAND_OPACITY) }],
    hooks: {
      draw: [
        (plot) => {
          const { left, top, width } = plot.bbox;
          drawLabel(plot, 'line: speed, band: 95 %', {
            x: left + width,
            y: top + 18 * devicePixelRatio,
            colour: colours.muted,
          });
        },
      ],
    },
  };
}

/** Lower and upper end of the speed axis for values between `low` and `high`. */
function speedSpan(low: number | null, high: number | null): [number, number] {
  if (low === null || high === null) return [0, 1];
  const middle = (low + high) / 2;
  const half = Math.max((high - low) * (1 / 2 + MARGIN_FRACTION), (middle * LEAST_SPAN_FRACTION) / 2);
  return [Math.max(0, middle - half), middle + half];
}

/** A point between two gaps draws no line and needs a dot. */
function hasLonePoints(values: ArrayLike<number | null | undefined>): boolean {
  return Array.from(values).some(
    (value, index) => value != null && values[index - 1] == null && values[index + 1] == null,
  );
}
