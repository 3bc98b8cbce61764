import { lineLevel } from '#lib/signal/orderLevels.ts';
import type { OrderLevels } from '#lib/signal/orderLevels.ts';
import type { OrderPeak } from '#lib/signal/orderPeaks.ts';
import { matchPeaks } from './peakMatch.ts';
import type { PeakMatch } from './peakMatch.ts';

/** One speed that the sound could mean, in terms of the tracked rate. */
export interface Hypothesis {
  /** Event rate over the tracked rate. */
  readonly ratio: number;
  readonly eventsPerTurn: number;
  /** Other orders of the shaft that are expected to sound. */
  readonly expectedOrders: readonly number[];
}

/** Evidence of one domain (waveform or envelope) for one hypothesis; levels in nepers above noise. */
export interface DomainFeatures extends PeakMatch {
  /** Weighted mean level of the event orders, [0, 10]. */
  readonly eventLevel: number;
  /** Part of the first four event orders that sound, [0, 1]. */
  readonly hitFraction: number;
  /** How far every second (third …) event order stands above the others: evidence that the rate is too low, [0, 6]. */
  readonly eventAlternation: number;
  /** The same among the shaft orders between events: only even ones sounding means that the shaft turns twice as fast, [0, 6]. */
  readonly shaftAlternation: number;
  /** Mean level of the shaft orders between events over that of the events: near 1 they are events themselves, [0, 2]. */
  readonly betweenRatio: number;
  /** 1 where the orders between are as strong as the events, 0 below four fifths of them: no contact is that uneven, [0, 1]. */
  readonly betweenEvenness: number;
  /** Lines between the events that no division of the turn explains: evidence that the rate is too high, [0, 6]. */
  readonly strayLevel: number;
  /** Lines half way (or at thirds) between shaft orders, with more than one event a turn: the same evidence, [0, 6]. */
  readonly strayShaftLevel: number;
  /** Part of the shaft orders below the second event order that sound, [0, 1]. */
  readonly shaftShare: number;
}

const EVENT_WEIGHTS = [1, 1, 0.9, 0.8, 0.7, 0.6, 0.5, 0.4] as const;
const WEIGHT_RESERVE = 0.5;
const HIT_NEPERS = 0.8;
const HIT_ORDERS = 4;
const LARGEST_DIFFERENCE = 6;
const LARGEST_RATIO = 2;
const EVEN_RATIO = 0.8;
const PRIMES = [2, 3, 5, 7] as const;
const SHAFT_PRIMES = [2, 3] as const;
const MOST_SHAFT_ORDERS = 28;
const STRAY_EVENT_ORDERS = 6;
const STRAY_SHAFT_ORDERS = 12;
/** A half between two orders nearer than this many resolved bins to them cannot be told from them. */
const APART_BINS = 3;
/** The same for finer fractions, which the skirts of strong lines reach sooner. */
const SKIRT_BINS = 5;

const NO_EVIDENCE: DomainFeatures = {
  eventLevel: 0,
  hitFraction: 0,
  eventAlternation: 0,
  shaftAlternation: 0,
  betweenRatio: 0,
  betweenEvenness: 0,
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
  const hasShaftOrders = eventsPerTurn > 1;
  const shaft = hasShaftOrders ? ratio / eventsPerTurn : ratio;
  // Of a slow shaft's waveform only high multiples can be heard.
  const first = Math.max(1, Math.ceil(spectrum.lowestOrder / ratio));
  const events = EVENT_WEIGHTS.map((_, index) => lineLevel(spectrum, (index + first) * ratio));
  const expected = expectedOrders
    .map((order) => lineLevel(spectrum, (order * ratio) / eventsPerTurn))
    .filter(Number.isFinite);
  if (!events.some(Number.isFinite) && expected.length === 0) return NO_EVIDENCE;
  const between = hasShaftOrders ? ordersBetween(spectrum, shaft, eventsPerTurn) : [];
  const low = between.filter(({ order }) => order < 2 * eventsPerTurn);
  const eventLevel = weightedLevel(events, expected);
  const ratioBetween = betweenRatio(meanLevel(low.map(({ level }) => level)), eventLevel);
  const shaftComb = { spacing: shaft, divisors: SHAFT_PRIMES, firstTooth: 0, toothCount: STRAY_SHAFT_ORDERS };
  const numbered = events.map((level, index) => ({ order: index + first, level }));
  return {
    eventLevel,
    hitFraction: soundingFraction(events.slice(0, HIT_ORDERS)),
    eventAlternation: alternation(numbered),
    shaftAlternation: alternation(between),
    betweenRatio: ratioBetween,
    betweenEvenness: Math.max(0, Math.min(1, (ratioBetween - EVEN_RATIO) / (1 - EVEN_RATIO))),
    strayLevel: strayLevel(spectrum, hypothesis, first),
    strayShaftLevel: hasShaftOrders ? levelBetween(spectrum, shaftComb) : 0,
    shaftShare: soundingFraction(low.map(({ level }) => level)),
    ...matchPeaks(spectrum, peaks, { ratio, shaft, first }),
  };
}

interface NumberedLevel {
  readonly order: number;
  readonly level: number;
}

/** Levels of the lowest shaft orders that can be heard and are no events. */
function ordersBetween(spectrum: OrderLevels, shaft: number, eventsPerTurn: number): NumberedLevel[] {
  return Array.from({ length: MOST_SHAFT_ORDERS }, (_, index) => index + 1)
    .filter((order) => !Number.isInteger(order / eventsPerTurn))
    .map((order) => ({ order, level: lineLevel(spectrum, order * shaft) }))
    .filter(({ level }) => Number.isFinite(level));
}

function betweenRatio(betweenLevel: number, eventLevel: number): number {
  return Math.min(LARGEST_RATIO, betweenLevel / (eventLevel + WEIGHT_RESERVE));
}

function weightedLevel(events: readonly number[], expected: readonly number[]): number {
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

/** Part of the levels that can be heard which stand out; 0 when none can be heard. */
function soundingFraction(levels: readonly number[]): number {
  const heard = levels.filter(Number.isFinite);
  return heard.length === 0 ? 0 : heard.filter((level) => level > HIT_NEPERS).length / heard.length;
}

/** Largest difference, over small primes m, between the mean level of multiples of m and of the rest, [0, 6]. */
function alternation(numbered: readonly NumberedLevel[]): number {
  let largest = 0;
  for (const prime of PRIMES) {
    const multiples = numbered.filter(({ order }) => order % prime === 0).map(({ level }) => level);
    const others = numbered.filter(({ order }) => order % prime !== 0).map(({ level }) => level);
    largest = Math.max(largest, meanLevel(multiples) - meanLevel(others));
  }
  return Math.min(LARGEST_DIFFERENCE, largest);
}

/** Mean over the levels that can be heard; 0 when none can. */
function meanLevel(levels: readonly number[]): number {
  let sum = 0;
  let count = 0;
  for (const level of levels) {
    if (!Number.isFinite(level)) continue;
    sum += level;
    count++;
  }
  return count > 0 ? sum / count : 0;
}

/** Strongest comb between the events at thirds, halves … that are no division of the turn. */
function strayLevel(spectrum: OrderLevels, { ratio, eventsPerTurn }: Hypothesis, first: number): number {
  const divisors = PRIMES.filter((prime) => !(Number.isInteger(eventsPerTurn) && eventsPerTurn % prime === 0));
  return levelBetween(spectrum, { spacing: ratio, divisors, firstTooth: first - 1, toothCount: STRAY_EVENT_ORDERS });
}

interface Comb {
  readonly spacing: number;
  /** Fractions between the teeth are j / divisor, as far as the spectrum can tell them from the teeth. */
  readonly divisors: readonly number[];
  /** Tooth after which the first gap begins. */
  readonly firstTooth: number;
  readonly toothCount: number;
}

/** Highest mean level of the lines at one fraction between the teeth of a comb, [0, 6]. */
function levelBetween(spectrum: OrderLevels, comb: Comb): number {
  const binsPerTooth = comb.spacing / spectrum.ordersPerBin / spectrum.resolutionBins;
  let highest = 0;
  for (const divisor of comb.divisors) {
    if (binsPerTooth / divisor < (divisor === 2 ? APART_BINS : SKIRT_BINS)) continue;
    for (let part = 1; part < divisor; part++) {
      const levels = Array.from({ length: comb.toothCount }, (_, tooth) =>
        lineLevel(spectrum, (comb.firstTooth + tooth + part / divisor) * comb.spacing),
      );
      highest = Math.max(highest, meanLevel(levels));
    }
  }
  return Math.min(LARGEST_DIFFERENCE, highest);
}
