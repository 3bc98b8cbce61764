import type { RankedHypothesis } from './rankHypotheses.ts';
import { LEAST_SIGNIFICANCE, significance } from './rotationVerdict.ts';

/** Without a second source of evidence no sound makes a figure surer than this. */
const HIGHEST_CONFIDENCE = 0.98;
/** Evidence beyond the threshold, nepers, at which a line no longer loses confidence for its weakness. */
const CLEAR_EXCESS = 1.5;

/**
 * Probability that the speed is right within 1 %: that of its ratio among all others, less what a weak or restless
 * track takes away.
 *
 * @returns [0, 0.98]
 */
export function confidenceOf(best: RankedHypothesis): number {
  const strength = Math.min(1, 0.5 + (0.5 * (significance(best) - LEAST_SIGNIFICANCE)) / CLEAR_EXCESS);
  const calm = 1 / (1 + best.family.quality.restlessness);
  return Math.max(0, Math.min(HIGHEST_CONFIDENCE, best.probability * strength * calm));
}
