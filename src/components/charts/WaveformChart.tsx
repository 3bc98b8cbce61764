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
  /** Lowest and highest sample around each time, full scale ±1, shape [pointCount]. */
  readonly minimum: readonly (number | null)[];
  readonly maximum: readonly (number | null)[];
  readonly onHearFrom?: (timeSeconds: number) => void;
}

const HEIGHT_PX = 200;
const BODY_OPACITY = 0.35;

/** Lowest and highest sample over time between the limits of full scale. */
export function WaveformChart({ title, fileName, timeSeconds, minimum, maximum, onHearFrom }: Props) {
  const data = useMemo(
    (): uPlot.AlignedData => [[...timeSeconds], [...maximum], [...minimum]],
    [timeSeconds, minimum, maximum],
  );
  const home = useMemo(() => wholeRange(timeSeconds), [timeSeconds]);
  const optionsOf = useCallback((colours: ChartColours) => waveformOptions(colours), []);
  return (
    <LinePlot
      title={title}
      fileName={fileName}
      xLabel="Time, s"
      yLabel="Sample value, full scale is ±1"
      heightPx={HEIGHT_PX}
      data={data}
      columns={[
        { label: 'time', unit: 's', decimals: 4, values: timeSeconds },
        { label: 'highest', unit: '', decimals: 4, values: maximum },
        { label: 'lowest', unit: '', decimals: 4, values: minimum },
      ]}
      home={home}
      optionsOf={optionsOf}
      hint="Where the sound touches full scale for long, it is cut off."
      readOutOf={(row) =>
        `At ${numberText(timeSeconds[row] ?? 0, 2)} s: from ${numberText(minimum[row] ?? 0, 2)} to ${numberText(maximum[row] ?? 0, 2)}`
      }
      {...(onHearFrom && { onPick: onHearFrom })}
    />
  );
}

function waveformOptions(colours: ChartColours): PlotOptions {
  const edge = { stroke: colours.ink, width: 0.75, points: { show: false } };
  return {
    ...basePlotOptions(colours),
    scales: { y: { range: [-1.1, 1.1] } },
    series: [{}, edge, edge],
    bands: [{ series: [1, 2], fill: withOpacity(colours.ink, BODY_OPACITY) }],
    hooks: {
      draw: [
        (plot) => {
          const { left, width } = plot.bbox;
          for (const [level, text] of [
            [1, 'full scale'],
            [-1, ''],
          ] as const) {
            const y = Math.round(plot.valToPos(level, 'y', true));
            plot.ctx.fillStyle = colours.muted;
            plot.ctx.fillRect(left, y, width, devicePixelRatio);
            drawLabel(plot, text, { x: left + width, y: y - 2, colour: colours.muted });
          }
        },
      ],
    },
  };
}
