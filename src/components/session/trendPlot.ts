import uPlot from 'uplot';
import type { ChartColours } from '#components/charts/chartColours.ts';
import type { PlotOptions } from '#components/charts/createPlot.ts';
import { basePlotOptions } from '#components/charts/plotStyle.ts';
import type { SessionResultView } from '#lib/schemas/session.ts';
import { isUnsureConfidence } from '#components/recording/recordingStanding.ts';
import type { SpeedAxis } from './speedAxis.ts';

export type TrendPoint = SessionResultView['points'][number];
/** What the recordings are laid out by. */
export const TREND_ORDERS = ['order', 'supply'] as const;
export type TrendBy = (typeof TREND_ORDERS)[number];

/** A recording with its place on the horizontal axis; places ascend. */
export interface PlacedPoint {
  readonly point: TrendPoint;
  /** Order of recording from 1, or supply volts. */
  readonly place: number;
}

/** Free room beside the first and the last point, as a fraction of the stretch between them. */
const SIDE_ROOM_FRACTION = 0.08;
const DOT_RADIUS_PX = 4;
const NEWEST_RADIUS_PX = 6;
const WHISKER_WIDTH_PX = 2;
const CAP_HALF_WIDTH_PX = 4;

/** The points in the order of the horizontal axis; by supply those without a voltage are left out. */
export function placedPoints(points: readonly TrendPoint[], by: TrendBy): PlacedPoint[] {
  if (by === 'order') return points.map((point, index) => ({ point, place: index + 1 }));
  return points
    .flatMap((point) => (point.supplyVolts === null ? [] : [{ point, place: point.supplyVolts }]))
    .toSorted((a, b) => a.place - b.place);
}

/** A speed that does not count yet: unsure, and nobody has looked at it. */
function isHollow({ confidence, reviewed }: TrendPoint): boolean {
  return isUnsureConfidence(confidence) && !reviewed;
}

/**
 * Columns of the line that joins the speeds that count, with an empty row on both sides so that no dot sits on the
 * edge. A hollow dot has its row, but the line passes it by.
 */
export function trendColumns(placed: readonly PlacedPoint[]): uPlot.AlignedData {
  const first = placed[0]?.place ?? 0;
  const last = placed.at(-1)?.place ?? 1;
  const room = last > first ? (last - first) * SIDE_ROOM_FRACTION : 1;
  return [
    [first - room, ...placed.map(({ place }) => place), last + room],
    [null, ...placed.map(({ point }) => (isHollow(point) ? null : point.rpm)), null],
  ];
}

/** Options of the plot: dots with 95 % whiskers on the axis that the table shares, the newest in copper. */
export function trendPlotOptions(
  placed: readonly PlacedPoint[],
  axis: SpeedAxis,
  newestId: string | null,
  by: TrendBy,
) {
  return (colours: ChartColours): PlotOptions => {
    const base = basePlotOptions(colours);
    const [xAxis, yAxis] = base.axes ?? [];
    return {
      ...base,
      axes: [
        {
          ...xAxis,
          ...(by === 'order' && {
            incrs: WHOLE_STEPS,
            values: orderTexts(placed.length),
          }),
        },
        { ...yAxis, splits: () => [...axis.ticksRpm] },
      ],
      scales: { y: { range: [axis.minimumRpm, axis.maximumRpm] } },
      series: [
        {},
        {
          stroke: colours.muted,
          width: 1,
          points: { show: false },
          spanGaps: true,
        },
      ],
      hooks: {
        draw: [
          (plot) => {
            for (const { point, place } of placed) {
              drawPoint(plot, {
                point,
                place,
                colours,
                isNewest: point.recordingId === newestId,
              });
            }
          },
        ],
      },
    };
  };
}

/** The free room on both sides has no recording to number. */
function orderTexts(count: number): uPlot.Axis.DynamicValues {
  return (_, places) => places.map((place) => (place >= 1 && place <= count ? String(place) : ''));
}

const WHOLE_STEPS = [1, 2, 5, 10, 20, 50, 100, 200, 500, 1000];

interface DrawnPoint extends PlacedPoint {
  readonly colours: ChartColours;
  readonly isNewest: boolean;
}

function drawPoint(plot: uPlot, { point, place, colours, isNewest }: DrawnPoint): void {
  const { ctx } = plot;
  const scale = uPlot.pxRatio;
  const x = plot.valToPos(place, 'x', true);
  const y = plot.valToPos(point.rpm, 'y', true);
  const low = plot.valToPos(point.rpmLow, 'y', true);
  const high = plot.valToPos(point.rpmHigh, 'y', true);
  if (x < plot.bbox.left || x > plot.bbox.left + plot.bbox.width) return;
  const cap = CAP_HALF_WIDTH_PX * scale;
  ctx.save();
  ctx.strokeStyle = ctx.fillStyle = isNewest ? colours.copper : colours.ink;
  ctx.lineWidth = WHISKER_WIDTH_PX * scale;
  ctx.beginPath();
  for (const [fromX, fromY, toX, toY] of [
    [x, low, x, high],
    [x - cap, low, x + cap, low],
    [x - cap, high, x + cap, high],
  ] as const) {
    ctx.moveTo(fromX, fromY);
    ctx.lineTo(toX, toY);
  }
  ctx.stroke();
  ctx.beginPath();
  ctx.arc(x, y, (isNewest ? NEWEST_RADIUS_PX : DOT_RADIUS_PX) * scale, 0, 2 * Math.PI);
  if (isHollow(point)) ctx.fillStyle = colours.sheet;
  ctx.fill();
  ctx.stroke();
  ctx.restore();
}
