import { useMemo } from 'react';
import { LinePlot } from '#components/charts/LinePlot.tsx';
import type { ChartColumn } from '#components/charts/chartColumns.ts';
import { wholeRange } from '#components/charts/plotRange.ts';
import { plainNumberText } from '#lib/format/numberText.ts';
import { uncertainDecimals, uncertainSentence } from '#lib/format/uncertainText.ts';
import type { SpeedAxis } from './speedAxis.ts';
import {
  placedPoints,
  trendColumns,
  trendPlotOptions,
  type PlacedPoint,
  type TrendBy,
  type TrendPoint,
} from './trendPlot.ts';

interface Props {
  readonly title: string;
  /** Oldest first. */
  readonly points: readonly TrendPoint[];
  /** Shared with the table below the chart. */
  readonly axis: SpeedAxis;
  readonly by: TrendBy;
  readonly newestId: string | null;
}

const HEIGHT_PX = 320;
const X_LABELS: Record<TrendBy, string> = { order: 'Recording, in order', supply: 'Supply, V' };

/** The speed over the recordings of a session: a dot with its interval each. */
export function SessionTrendChart({ title, points, axis, by, newestId }: Props) {
  const placed = useMemo(() => placedPoints(points, by), [points, by]);
  const data = useMemo(() => trendColumns(placed), [placed]);
  const home = useMemo(() => wholeRange(data[0]), [data]);
  const columns = useMemo(() => peopleColumns(placed, by), [placed, by]);
  const optionsOf = useMemo(() => trendPlotOptions(placed, axis, newestId, by), [placed, axis, newestId, by]);
  /** The first and the last row of the plot are room, not recordings. */
  const pointAt = (row: number) => placed[Math.min(placed.length - 1, Math.max(0, row - 1))];
  return (
    <LinePlot
      title={title}
      fileName="session-trend"
      xLabel={X_LABELS[by]}
      yLabel="Shaft speed, rpm"
      heightPx={HEIGHT_PX}
      data={data}
      columns={columns}
      home={home}
      optionsOf={optionsOf}
      readOutOf={(row) => readOut(pointAt(row), by)}
      hint="Point at a recording to read it; press to open it."
      onPick={(place) => {
        const nearest = placed.toSorted((a, b) => Math.abs(a.place - place) - Math.abs(b.place - place))[0];
        if (nearest) location.assign(`/recordings/${nearest.point.recordingId}`);
      }}
    />
  );
}

function readOut(placed: PlacedPoint | undefined, by: TrendBy): string {
  if (placed === undefined) return '';
  const { point, place } = placed;
  const where = by === 'order' ? `Recording ${String(place)}` : `At ${plainNumberText(place)} V`;
  const speed = uncertainSentence({ value: point.rpm, low: point.rpmLow, high: point.rpmHigh }, 'rpm');
  return `${where}: ${speed}${point.buildName === null ? '' : `, ${point.buildName}`}`;
}

const VOLT_DECIMALS = 2;

function peopleColumns(placed: readonly PlacedPoint[], by: TrendBy): ChartColumn[] {
  const decimals = Math.max(0, ...placed.map(({ point }) => speedDecimals(point)));
  const speed = (label: string, valueOf: (point: TrendPoint) => number): ChartColumn => ({
    label,
    unit: 'rpm',
    decimals,
    values: placed.map(({ point }) => valueOf(point)),
  });
  return [
    by === 'order'
      ? { label: 'recording', unit: '', decimals: 0, values: placed.map(({ place }) => place) }
      : { label: 'supply', unit: 'V', decimals: VOLT_DECIMALS, values: placed.map(({ place }) => place) },
    speed('speed', ({ rpm }) => rpm),
    speed('95 % from', ({ rpmLow }) => rpmLow),
    speed('95 % to', ({ rpmHigh }) => rpmHigh),
  ];
}

function speedDecimals({ rpm, rpmLow, rpmHigh }: TrendPoint): number {
  return uncertainDecimals({ value: rpm, low: rpmLow, high: rpmHigh });
}
