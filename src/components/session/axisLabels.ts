import { axisPercent, type SpeedAxis } from './speedAxis.ts';

/** Nearer to an end than this, per cent of the axis, a label is pulled in. */
const EDGE_PERCENT = 6;
const PER_CENT = 100;

/** Which part of a label stands at its tick: its middle, or at the ends its edge, so that nothing sticks out. */
export function anchorAt(percent: number): 'start' | 'middle' | 'end' {
  if (percent < EDGE_PERCENT) return 'start';
  return percent > PER_CENT - EDGE_PERCENT ? 'end' : 'middle';
}

/** Room that labels take, per cent of the axis. */
export interface LabelWidth {
  readonly digitPercent: number;
  readonly gapPercent: number;
}

/**
 * The ticks whose labels stand side by side without touching. The ends of the axis come first, for they say how far it
 * reaches; then from the left whatever still has room.
 *
 * @returns ascending, rpm
 */
export function ticksWithRoom(axis: SpeedAxis, width: LabelWidth): number[] {
  const { ticksRpm } = axis;
  const kept: number[] = [];
  for (const rpm of [...ticksRpm.slice(0, 1), ...ticksRpm.slice(-1), ...ticksRpm.slice(1, -1)]) {
    const own = labelExtent(axis, rpm, width);
    const others = kept.map((other) => labelExtent(axis, other, width));
    if (others.every(({ from, to }) => to <= own.from || own.to <= from)) kept.push(rpm);
  }
  return kept.toSorted((a, b) => a - b);
}

/** Where a label with its gap begins and ends, per cent of the axis. */
export function labelExtent(axis: SpeedAxis, rpm: number, { digitPercent, gapPercent }: LabelWidth) {
  const at = axisPercent(axis, rpm);
  const width = String(rpm).length * digitPercent + gapPercent;
  const from = at - width * SHARE_BEFORE_TICK[anchorAt(at)];
  return { from, to: from + width };
}

const SHARE_BEFORE_TICK = { start: 0, middle: 1 / 2, end: 1 } as const;
