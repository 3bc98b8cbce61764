import type { MeasuredSpeed } from '#components/recording/recordingStanding.ts';

/** One axis of shaft speed that several rows share. */
export interface SpeedAxis {
  readonly minimumRpm: number;
  readonly maximumRpm: number;
  /** Logarithmic when the speeds lie so far apart that a linear axis would crowd the slow ones. */
  readonly isLogarithmic: boolean;
  readonly ticksRpm: readonly number[];
}

/** Speeds further apart than this factor stand on a logarithmic axis. */
const LINEAR_MAXIMUM_RATIO = 8;
const TICK_TARGET_COUNT = 4;
const ROUND_STEPS = [1, 2, 5, 10] as const;
const PER_CENT = 100;

/** An axis for speeds of different motors, with round ends that hold all intervals; null without speeds. */
export function speedAxis(speeds: readonly MeasuredSpeed[]): SpeedAxis | null {
  if (speeds.length === 0) return null;
  const { lowest, highest } = extentOf(speeds);
  return lowest > 0 && highest / lowest > LINEAR_MAXIMUM_RATIO
    ? logarithmicAxis(lowest, highest)
    : linearAxis(lowest, highest);
}

/** An axis for speeds of one motor, on which a speed–voltage line stays a line; null without speeds. */
export function linearSpeedAxis(speeds: readonly MeasuredSpeed[]): SpeedAxis | null {
  if (speeds.length === 0) return null;
  const { lowest, highest } = extentOf(speeds);
  return linearAxis(lowest, highest);
}

function extentOf(speeds: readonly MeasuredSpeed[]): { lowest: number; highest: number } {
  return {
    lowest: Math.min(...speeds.map(({ rpmLow }) => rpmLow)),
    highest: Math.max(...speeds.map(({ rpmHigh }) => rpmHigh)),
  };
}

/** Where a speed stands on the axis, per cent from its start, kept inside it. */
export function axisPercent({ minimumRpm, maximumRpm, isLogarithmic }: SpeedAxis, rpm: number): number {
  const scale = isLogarithmic ? Math.log : (value: number) => value;
  const fraction = (scale(rpm) - scale(minimumRpm)) / (scale(maximumRpm) - scale(minimumRpm));
  return PER_CENT * Math.min(1, Math.max(0, fraction));
}

function linearAxis(lowest: number, highest: number): SpeedAxis {
  // Equal speeds still need an axis: a tenth of the speed around them.
  const width = highest > lowest ? highest - lowest : Math.max(1, highest / 10);
  const step = roundStep(width / TICK_TARGET_COUNT);
  const first = Math.floor((lowest - (highest > lowest ? 0 : width / 2)) / step);
  const last = Math.ceil((highest + (highest > lowest ? 0 : width / 2)) / step);
  const ticksRpm = Array.from({ length: last - first + 1 }, (_, index) =>
    Number(((first + index) * step).toPrecision(12)),
  );
  return { minimumRpm: first * step, maximumRpm: last * step, isLogarithmic: false, ticksRpm };
}

function logarithmicAxis(lowest: number, highest: number): SpeedAxis {
  const firstDecade = Math.floor(Math.log10(lowest));
  const lastDecade = Math.ceil(Math.log10(highest));
  const rounds = Array.from(
    { length: lastDecade - firstDecade + 1 },
    (_, index) => 10 ** (firstDecade + index),
  ).flatMap((decade) => [decade, 2 * decade, 5 * decade]);
  const minimumRpm = rounds.findLast((rpm) => rpm <= lowest) ?? lowest;
  const maximumRpm = rounds.find((rpm) => rpm >= highest) ?? highest;
  const ticksRpm = rounds.filter((rpm) => rpm >= minimumRpm && rpm <= maximumRpm);
  return { minimumRpm, maximumRpm, isLogarithmic: true, ticksRpm };
}

/** The smallest of 1, 2, 5 times a power of ten that is not below `step`. */
function roundStep(step: number): number {
  const decade = 10 ** Math.floor(Math.log10(step));
  const factor = ROUND_STEPS.find((round) => round * decade >= step * (1 - Number.EPSILON)) ?? 10;
  return factor * decade;
}
