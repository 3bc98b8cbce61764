import { numberText } from './numberText.ts';

/** More decimals than this help nobody, however narrow an interval is. */
const DECIMALS_MAXIMUM = 4;

/** A value with its 95 % interval, all in one unit; `low` ≤ `value` ≤ `high`. */
export interface Uncertain {
  readonly value: number;
  readonly low: number;
  readonly high: number;
}

/**
 * Decimals that an uncertain value deserves: the first digit of half the interval is the last that is shown.
 *
 * @returns integer in [0, 4]; 0 when the interval is empty or not finite
 * @example uncertainDecimals({ value: 2874, low: 2868.1, high: 2880.3 }) // 0
 * @example uncertainDecimals({ value: 4.31, low: 4.29, high: 4.33 }) // 2
 */
export function uncertainDecimals({ low, high }: Uncertain): number {
  const halfWidth = (high - low) / 2;
  if (!(halfWidth > 0) || !Number.isFinite(halfWidth)) return 0;
  return Math.min(DECIMALS_MAXIMUM, Math.max(0, -Math.floor(Math.log10(halfWidth))));
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
  return {
    value: numberText(uncertain.value, decimals),
    low: numberText(uncertain.low, decimals),
    high: numberText(uncertain.high, decimals),
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
