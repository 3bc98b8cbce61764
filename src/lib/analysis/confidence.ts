import type { RankedHypothesis } from './rankHypotheses.ts';
import { LEAST_SIGNIFICANCE, significance } from './rotationVerdict.ts';

/** Without a second source of evidence no sound makes a figure surer than this. */
const HIGHEST_CONFIDENCE = 0.98;
/** Evidence beyond the threshold, nepers, at which a line no longer loses confidence for its weakness. */
const CLEAR_EXCESS = 1.5;
/** A single line could be anything that hums or whines: it makes no figure that needs no person. */
const LONE_LINE_CONFIDENCE = 0.45;
/** Event orders of one domain that sound, of four, when only one does. */
const ONE_OF_FOUR = 0.25;

/**
 * Probability that the speed is right within 1 %: that of its ratio among all others, less what a weak or restless
 * track takes away.
 *
 * @returns [0, 0.98]
 */
export function confidenceOf(best: RankedHypothesis): number {
  const strength = Math.min(1, 0.5 + (0.5 * (significance(best) - LEAST_SIGNIFICANCE)) / CLEAR_EXCESS);
  const calm = 1 / (1 + best.family.quality.restlessness);
  const highest = isLoneLine(best) ? LONE_LINE_CONFIDENCE : HIGHEST_CONFIDENCE;
  return Math.max(0, Math.min(highest, best.probability * strength * calm));
}

/** Whether nothing but one line was heard: no multiple, no rhythm in the loudness, no other order of the shaft. */
function isLoneLine({ waveform, envelope }: RankedHypothesis): boolean {
  const isAlone = waveform.hitFraction <= ONE_OF_FOUR && envelope.hitFraction <= ONE_OF_FOUR;
  return isAlone && Math.max(waveform.shaftShare, envelope.shaftShare) <= ONE_OF_FOUR;
}
