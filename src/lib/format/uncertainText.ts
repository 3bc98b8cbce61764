import { numberText } from './numberText.ts';

/** However narrow an interval is: a phone's sample clock is not known better than some parts in 100 000. */
const SIGNIFICANT_DIGITS_MAXIMUM = 5;
/** For values next to zero, whose significant digits lie far behind the mark. */
const DECIMALS_MAXIMUM = 4;

/** A value with its 95 % interval, all in one unit; `low` ≤ `value` ≤ `high`. */
export interface Uncertain {
  readonly value: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Decimals that an uncertain value deserves: the first digit of half the interval is the last that is shown, and
 * the value shows at most five significant digits.
 *
 * @returns integer in [0, 4]; 0 when the interval is empty or not finite
 * @example uncertainDecimals({ value: 2874, low: 2868.1, high: 2880.3 }) // 0
 * @example uncertainDecimals({ value: 4.31, low: 4.29, high: 4.33 }) // 2
 */
export function uncertainDecimals({ value, low, high }: Uncertain): number {
  const halfWidth = (high - low) / 2;
  if (!(halfWidth > 0) || !Number.isFinite(halfWidth)) return 0;
  const meaningful = -Math.floor(Math.log10(halfWidth));
  const readable =
    value === 0 ? DECIMALS_MAXIMUM : SIGNIFICANT_DIGITS_MAXIMUM - 1 - Math.floor(Math.log10(Math.abs(value)));
  return Math.max(0, Math.min(DECIMALS_MAXIMUM, meaningful, readable));
}

/** The texts of one uncertain value, all with the same decimals. */
export interface UncertainText {
  readonly value: string;
  readonly low: string;
  readonly high: string;
}

/**
 * An uncertain value as people read it.
 *
 * @example uncertainText({ value: 2874.04, low: 2868.1, high: 2880.3 }) // { value: '2874', low: '2868', high: '2880' }
 */
export function uncertainText(uncertain: Uncertain): UncertainText {
  const decimals = uncertainDecimals(uncertain);
  const value = numberText(uncertain.value, decimals);
  const low = numberText(uncertain.low, decimals);
  const high = numberText(uncertain.high, decimals);
  if (low !== high || uncertain.low === uncertain.high) return { value, low, high };
  // Finer than the decimals: rounded outwards, for no interval may look empty that is not.
  const scale = 10 ** decimals;
  return {
    value,
    low: numberText(Math.floor(uncertain.low * scale) / scale, decimals),
    high: numberText(Math.ceil(uncertain.high * scale) / scale, decimals),
  };
}

/**
 * One reading as one sentence part.
 *
 * @example uncertainSentence({ value: 2874, low: 2868.1, high: 2880.3 }, 'rpm') // '2874 rpm, between 2868 and 2880 (95 %)'
 */
export function uncertainSentence(uncertain: Uncertain, unit: string): string {
  const { value, low, high } = uncertainText(uncertain);
  return `${value} ${unit}, between ${low} and ${high} (95 %)`;
}
