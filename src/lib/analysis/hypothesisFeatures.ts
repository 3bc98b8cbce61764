import { lineLevel } from "#lib/signal/orderLevels.ts";
import type { OrderLevels, OrderPeak } from "#lib/signal/orderLevels.ts";

/** One speed that the sound could mean, in terms of the tracked rate. */
export interface Hypothesis {
  /** Event rate over the tracked rate. */
  readonly ratio: number;
  readonly eventsPerTurn: number;
  /** Other orders of the shaft that are expected to sound. */
  readonly expectedOrders: readonly number[];
}

/** Evidence of one domain (waveform or envelope) for one hypothesis; levels in nepers above noise. */
export interface DomainFeatures {
  /** Weighted mean level of the event orders, [0, 10]. */
  readonly eventLevel: number;
  /** Part of the first four event orders that sound, [0, 1]. */
  readonly hitFraction: number;
  /** How far every second (third …) event order stands above the others: evidence that the rate is too low, [0, 6]. */
  readonly eventAlternation: number;
  /** The same among all shaft orders: only even ones sounding means that the shaft turns twice as fast, [0, 6]. */
  readonly shaftAlternation: number;
  /** Lines between the events that no division of the turn explains: evidence that the rate is too high, [0, 6]. */
  readonly strayLevel: number;
  /** Lines half way (or at thirds) between shaft orders, with more than one event a turn: the same evidence, [0, 6]. */
  readonly strayShaftLevel: number;
  /** Part of the strength of all lines that lies on no shaft order, beyond what chance puts there, [0, 1]. */
  readonly unexplainedShare: number;
  /** Part of the strength of all lines that lies on event orders, [0, 1]. */
  readonly eventShare: number;
  /** 1 when the strongest line is the event rate, 1/√h for its h-th multiple, 0.4 for another shaft order, 0 otherwise. */
  readonly strongestIsEvent: number;
  /** Part of the shaft orders below the second event order that sound, [0, 1]. */
  readonly shaftShare: number;
}

const EVENT_WEIGHTS = [1, 1, 0.9, 0.8, 0.7, 0.6, 0.5, 0.4] as const;
const WEIGHT_RESERVE = 0.5;
const HIT_NEPERS = 0.8;
const LARGEST_DIFFERENCE = 6;
const PRIMES = [2, 3, 5, 7] as const;
const MOST_SHAFT_ORDERS = 28;
const STRAY_EVENT_ORDERS = 6;
const MOST_STRAY_ORDERS = 12;
/** A line belongs to an order when it is nearer than this, in bins or as a fraction of its order. */
const MATCH_BINS = 2;
const MATCH_FRACTION = 8e-4;
/** Positions nearer to an event order than this many resolved bins cannot be told from it. */
const APART_BINS = 3;

const NO_EVIDENCE: DomainFeatures = {
  eventLevel: 0,
  hitFraction: 0,
  eventAlternation: 0,
  shaftAlternation: 0,
  strayLevel: 0,
  strayShaftLevel: 0,
  unexplainedShare: 0,
  eventShare: 0,
  strongestIsEvent: 0,
  shaftShare: 0,
};

/** Evidence of one domain for one hypothesis; all 0 where the domain cannot hear any event order. */
export function domainFeatures(
  spectrum: OrderLevels,
  peaks: readonly OrderPeak[],
  hypothesis: Hypothesis,
): DomainFeatures {
  const { ratio, eventsPerTurn, expectedOrders } = hypothesis;
  const shaft = shaftSpacing(hypothesis);
  const events = EVENT_WEIGHTS.map((_, index) =>
    lineLevel(spectrum, (index + 1) * ratio),
  );
  const expected = expectedOrders
    .map((order) => lineLevel(spectrum, (order * ratio) / eventsPerTurn))
    .filter(Number.isFinite);
  if (!events.some(Number.isFinite) && expected.length === 0)
    return NO_EVIDENCE;
  const shaftLevels = Array.from({ length: MOST_SHAFT_ORDERS }, (_, index) =>
    lineLevel(spectrum, (index + 1) * shaft),
  );
  const match = peakMatch(spectrum, peaks, hypothesis, shaft);
  return {
    eventLevel: weightedLevel(events, expected),
    hitFraction: hitFraction(events.slice(0, 4)),
    eventAlternation: alternation(events),
    shaftAlternation: eventsPerTurn > 1 ? alternation(shaftLevels) : 0,
    strayLevel: strayLevel(spectrum, hypothesis),
    strayShaftLevel:
      eventsPerTurn > 1
        ? between(spectrum, shaft, [2, 3], MOST_STRAY_ORDERS)
        : 0,
    shaftShare: eventsPerTurn > 1 ? shaftShare(shaftLevels, eventsPerTurn) : 0,
    ...match,
  };
}

/** Distance of shaft orders in tracked cycles. Fewer events than turns repeat only after several turns. */
function shaftSpacing({ ratio, eventsPerTurn }: Hypothesis): number {
  return eventsPerTurn > 1 ? ratio / eventsPerTurn : ratio;
}

function weightedLevel(
  events: readonly number[],
  expected: readonly number[],
): number {
  let sum = 0;
  let weights = WEIGHT_RESERVE;
  for (const [index, level] of events.entries()) {
    if (!Number.isFinite(level)) continue;
    const weight = EVENT_WEIGHTS[index] ?? 0;
    sum += weight * level;
    weights += weight;
  }
  for (const level of expected) {
    sum += level;
    weights += 1;
  }
  return sum / weights;
}

function hitFraction(levels: readonly number[]): number {
  const heard = levels.filter(Number.isFinite);
  return heard.length === 0
    ? 0
    : heard.filter((level) => level > HIT_NEPERS).length / heard.length;
}

/** Largest difference, over small primes m, between the mean level of multiples of m and of the rest. */
function alternation(levels: readonly number[]): number {
  let largest = 0;
  for (const prime of PRIMES) {
    const multiples = meanLevel(levels, (number) => number % prime === 0);
    const others = meanLevel(levels, (number) => number % prime !== 0);
    largest = Math.max(largest, multiples - others);
  }
  return Math.min(LARGEST_DIFFERENCE, largest);
}

/** Mean over the levels whose number from 1 is chosen; NaN-safe; 0 when none is heard. */
function meanLevel(
  levels: readonly number[],
  isChosen: (number: number) => boolean,
): number {
  let sum = 0;
  let count = 0;
  for (const [index, level] of levels.entries()) {
    if (!Number.isFinite(level) || !isChosen(index + 1)) continue;
    sum += level;
    count++;
  }
  return count > 0 ? sum / count : 0;
}

/** Strongest comb between the events at thirds, halves … that are no division of the turn. */
function strayLevel(
  spectrum: OrderLevels,
  { ratio, eventsPerTurn }: Hypothesis,
): number {
  const forbidden = PRIMES.filter(
    (prime) =>
      !(Number.isInteger(eventsPerTurn) && eventsPerTurn % prime === 0),
  );
  return between(spectrum, ratio, forbidden, STRAY_EVENT_ORDERS);
}

/**
 * Highest mean level of the lines at one fraction between the teeth of a comb.
 *
 * @param divisors fractions are j / divisor, as far as the spectrum can tell them from the teeth
 */
function between(
  spectrum: OrderLevels,
  spacing: number,
  divisors: readonly number[],
  toothCount: number,
): number {
  const apart =
    (APART_BINS * spectrum.resolutionBins * spectrum.ordersPerBin) / spacing;
  let highest = 0;
  for (const divisor of divisors) {
    if (1 / divisor < apart) continue;
    for (let part = 1; part < divisor; part++) {
      const levels = Array.from({ length: toothCount }, (_, tooth) =>
        lineLevel(spectrum, (tooth + part / divisor) * spacing),
      );
      highest = Math.max(
        highest,
        meanLevel(levels, () => true),
      );
    }
  }
  return Math.min(LARGEST_DIFFERENCE, highest);
}

function shaftShare(levels: readonly number[], eventsPerTurn: number): number {
  const own = levels
    .slice(0, Math.ceil(2 * eventsPerTurn) - 1)
    .filter((level, index) => {
      const isEvent = Number.isInteger((index + 1) / eventsPerTurn);
      return Number.isFinite(level) && !isEvent;
    });
  return own.length === 0
    ? 0
    : own.filter((level) => level > HIT_NEPERS).length / own.length;
}

type PeakMatch = Pick<
  DomainFeatures,
  "unexplainedShare" | "eventShare" | "strongestIsEvent"
>;

function peakMatch(
  spectrum: OrderLevels,
  peaks: readonly OrderPeak[],
  { ratio }: Hypothesis,
  shaft: number,
): PeakMatch {
  let total = Number.MIN_VALUE;
  let explained = 0;
  let byEvents = 0;
  let chance = 0;
  for (const { order, level } of peaks) {
    const tolerance = Math.max(
      MATCH_BINS * spectrum.resolutionBins * spectrum.ordersPerBin,
      MATCH_FRACTION * order,
    );
    total += level;
    chance += level * Math.min(1, (2 * tolerance) / shaft);
    if (isMultiple(order, ratio, tolerance)) byEvents += level;
    if (isMultiple(order, shaft, tolerance)) explained += level;
  }
  const beyondChance =
    (explained - chance) / Math.max(total - chance, 0.05 * total);
  return {
    unexplainedShare: 1 - Math.max(0, Math.min(1, beyondChance)),
    eventShare: byEvents / total,
    strongestIsEvent: strongestIsEvent(spectrum, peaks[0], ratio, shaft),
  };
}

function strongestIsEvent(
  spectrum: OrderLevels,
  peak: OrderPeak | undefined,
  ratio: number,
  shaft: number,
): number {
  if (!peak) return 0;
  const tolerance = Math.max(
    MATCH_BINS * spectrum.resolutionBins * spectrum.ordersPerBin,
    MATCH_FRACTION * peak.order,
  );
  if (isMultiple(peak.order, ratio, tolerance))
    return 1 / Math.sqrt(Math.round(peak.order / ratio));
  return isMultiple(peak.order, shaft, tolerance) ? OTHER_SHAFT_ORDER : 0;
}

const OTHER_SHAFT_ORDER = 0.4;

function isMultiple(
  order: number,
  spacing: number,
  tolerance: number,
): boolean {
  const multiple = Math.round(order / spacing);
  return multiple >= 1 && Math.abs(order - multiple * spacing) <= tolerance;
}
