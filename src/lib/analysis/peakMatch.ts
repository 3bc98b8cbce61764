import type { OrderLevels } from '#lib/signal/orderLevels.ts';
import type { OrderPeak } from '#lib/signal/orderPeaks.ts';

/** How the strongest lines of a spectrum lie on the orders of one hypothesis. */
export interface PeakMatch {
  /** Part of the strength of all lines that lies on no shaft order, beyond what chance puts there, [0, 1]. */
  readonly unexplainedShare: number;
  /** Part of the strength of all lines that lies on event orders, [0, 1]. */
  readonly eventShare: number;
  /** 1 when the strongest line is the lowest audible event order, 1/√h for the h-th from there, 0.4 for another shaft order, 0 otherwise. */
  readonly strongestIsEvent: number;
}

/** Spacings of a hypothesis in tracked cycles. */
interface OrderSpacing {
  /** Distance of event orders. */
  readonly ratio: number;
  /** Distance of shaft orders. */
  readonly shaft: number;
  /** First multiple of the event rate that can be heard. */
  readonly first: number;
}

/** A line belongs to an order when it is nearer than this, in resolved bins or as a fraction of its order. */
const MATCH_BINS = 2;
const MATCH_FRACTION = 8e-4;
const OTHER_SHAFT_ORDER = 0.4;
/** A comb so dense that chance explains nearly everything is judged by at least this part of the strength. */
const LEAST_JUDGED_FRACTION = 0.05;

/** Shares of the peaks, strongest first, that the orders explain; nothing is unexplained where nothing sounds. */
export function matchPeaks(spectrum: OrderLevels, peaks: readonly OrderPeak[], spacing: OrderSpacing): PeakMatch {
  let total = Number.MIN_VALUE;
  let explained = 0;
  let byEvents = 0;
  let chance = 0;
  for (const { order, level } of peaks) {
    const tolerance = toleranceAt(spectrum, order);
    total += level;
    chance += level * Math.min(1, (2 * tolerance) / spacing.shaft);
    if (isMultiple(order, spacing.ratio, tolerance)) byEvents += level;
    if (isMultiple(order, spacing.shaft, tolerance)) explained += level;
  }
  const beyondChance = (explained - chance) / Math.max(total - chance, LEAST_JUDGED_FRACTION * total);
  return {
    unexplainedShare: peaks.length === 0 ? 0 : 1 - Math.max(0, Math.min(1, beyondChance)),
    eventShare: byEvents / total,
    strongestIsEvent: peaks[0] ? rankOfStrongest(spectrum, peaks[0], spacing) : 0,
  };
}

function rankOfStrongest(spectrum: OrderLevels, { order }: OrderPeak, { ratio, shaft, first }: OrderSpacing): number {
  const tolerance = toleranceAt(spectrum, order);
  if (isMultiple(order, ratio, tolerance)) return 1 / Math.sqrt(Math.max(1, Math.round(order / ratio) - first + 1));
  return isMultiple(order, shaft, tolerance) ? OTHER_SHAFT_ORDER : 0;
}

function toleranceAt(spectrum: OrderLevels, order: number): number {
  return Math.max(MATCH_BINS * spectrum.resolutionBins * spectrum.ordersPerBin, MATCH_FRACTION * order);
}

function isMultiple(order: number, spacing: number, tolerance: number): boolean {
  const multiple = Math.round(order / spacing);
  return multiple >= 1 && Math.abs(order - multiple * spacing) <= tolerance;
}
