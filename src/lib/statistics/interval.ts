/** An estimate with the ends of its two-sided 95 % confidence interval; `low` ≤ `value` ≤ `high`. */
export interface Interval {
  readonly value: number;
  readonly low: number;
  readonly high: number;
}

/** Probability that a confidence interval of the product covers the truth. */
export const CONFIDENCE_LEVEL = 0.95;
