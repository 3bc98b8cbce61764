import { useCallback, useMemo } from 'react';
import type uPlot from 'uplot';
import { numberText } from '#lib/format/numberText.ts';
import type { ChartColours } from './chartColours.ts';
import type { PlotOptions } from './createPlot.ts';
import { LinePlot } from './LinePlot.tsx';
import { basePlotOptions } from './plotStyle.ts';
import { wholeRange } from './plotRange.ts';
import { spectrogramPicture, type SpectrogramColumns } from './spectrogramPicture.ts';

interface Props extends SpectrogramColumns {
  readonly title: string;
  readonly fileName: string;
  /** The event rate over the same times, which lies on the picture; null is a gap. Shape [timeCount]. */
  readonly eventHz: readonly (number | null)[];
}

const HEIGHT_PX = 240;
const LINE_PX = 1.75;
const CASING_PX = 3.75;

/** Level over time and frequency in one slate hue, with the event rate on it. */
export function SpectrogramChart({ title, fileName, timeSeconds, frequencyHz, levelDecibels, eventHz }: Props) {
  const data = useMemo((): uPlot.AlignedData => [[...timeSeconds], [...eventHz], [...eventHz]], [timeSeconds, eventHz]);
  const home = useMemo(() => wholeRange(timeSeconds), [timeSeconds]);
  const columns = useMemo(
    () => ({ timeSeconds, frequencyHz, levelDecibels }),
    [timeSeconds, frequencyHz, levelDecibels],
  );
  const optionsOf = useCallback((colours: ChartColours) => spectrogramOptions(colours, columns), [columns]);
  return (
    <LinePlot
      title={title}
      fileName={fileName}
      xLabel="Time, s"
      yLabel="Frequency, Hz; darker against the page is louder"
      heightPx={HEIGHT_PX}
      data={data}
      columns={[
        { label: 'time', unit: 's', decimals: 3, values: timeSeconds },
        { label: 'event rate', unit: 'Hz', decimals: 2, values: eventHz },
      ]}
      home={home}
      optionsOf={optionsOf}
      hint="The line is the event rate that the speed was counted by."
      readOutOf={(row) => {
        const rate = eventHz[row] ?? null;
        const moment = `At ${numberText(timeSeconds[row] ?? 0, 2)} s`;
        return rate === null ? `${moment}: no events heard` : `${moment}: ${numberText(rate, 1)} events a second`;
      }}
    />
  );
}

function spectrogramOptions(colours: ChartColours, columns: SpectrogramColumns): PlotOptions {
  const picture = spectrogramPicture(columns, colours);
  const { from, to } = wholeRange(columns.timeSeconds);
  const highestHz = columns.frequencyHz.at(-1) ?? 1;
  const lowestHz = columns.frequencyHz[0] ?? 0;
  return {
    ...basePlotOptions(colours),
    scales: { y: { range: [lowestHz, highestHz] } },
    series: [
      {},
      { stroke: colours.sheet, width: CASING_PX, points: { show: false } },
      { stroke: colours.copper, width: LINE_PX, points: { show: false } },
    ],
    hooks: {
      drawAxes: [
        (plot) => {
          const { ctx, bbox } = plot;
          const left = plot.valToPos(from, 'x', true);
          const right = plot.valToPos(to, 'x', true);
          ctx.save();
          ctx.beginPath();
          ctx.rect(bbox.left, bbox.top, bbox.width, bbox.height);
          ctx.clip();
          ctx.drawImage(picture, left, bbox.top, right - left, bbox.height);
          ctx.restore();
        },
      ],
    },
  };
}
