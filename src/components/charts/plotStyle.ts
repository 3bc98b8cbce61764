import type uPlot from 'uplot';
import { thinSpaced } from '#components/ui/digitGroups.ts';
import type { ChartColours } from './chartColours.ts';

/** Room left and right of the plotted area, px; the rack and the unrolled ring keep the same, so that all align. */
export const PLOT_LEFT_PX = 52;
export const PLOT_RIGHT_PX = 16;
const PLOT_TOP_PX = 10;
const X_AXIS_HEIGHT_PX = 32;
const FONT = '14px "Atkinson Hyperlegible", "Ripplebench Symbols", sans-serif';
const READ_OUT_DOT_PX = 9;
const TICK_SPACE_X_PX = 70;
const TICK_SPACE_Y_PX = 40;

const tickTexts: uPlot.Axis.DynamicValues = (_, values) =>
  values.map((value) => thinSpaced(String(Number(value.toPrecision(6))).replace('-', '−')));

/** What all line charts share: thin lines, hairline grid, no cursor lines, one dot for the read-out. */
export function basePlotOptions(colours: ChartColours): Pick<uPlot.Options, 'axes' | 'cursor' | 'legend' | 'padding'> {
  const axis = {
    stroke: colours.muted,
    font: FONT,
    grid: { stroke: colours.line, width: 1 },
    ticks: { show: false },
    values: tickTexts,
    labelSize: 0,
  } satisfies uPlot.Axis;
  return {
    axes: [
      {
        ...axis,
        size: X_AXIS_HEIGHT_PX,
        gap: 6,
        space: TICK_SPACE_X_PX,
        grid: { show: false },
        border: { show: true, stroke: colours.control, width: 1 },
      },
      { ...axis, size: PLOT_LEFT_PX, gap: 6, space: TICK_SPACE_Y_PX },
    ],
    cursor: {
      x: false,
      y: false,
      drag: { x: true, y: false, setScale: true },
      points: { size: READ_OUT_DOT_PX, stroke: colours.ink, fill: colours.sheet, width: 2 },
    },
    legend: { show: false },
    padding: [PLOT_TOP_PX, PLOT_RIGHT_PX, 0, 0],
  };
}

/** Writes a direct label into the plot, in the colour of what it names. */
export function drawLabel(
  plot: uPlot,
  text: string,
  at: { x: number; y: number; colour: string; align?: CanvasTextAlign },
) {
  const { ctx } = plot;
  ctx.save();
  ctx.font = FONT.replace('14px', `${String(14 * devicePixelRatio)}px`);
  ctx.fillStyle = at.colour;
  ctx.textAlign = at.align ?? 'right';
  ctx.textBaseline = 'bottom';
  ctx.fillText(thinSpaced(text), at.x, at.y);
  ctx.restore();
}
