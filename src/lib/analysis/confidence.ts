import type { FrontEnd } from '#lib/signal/frontEnd.ts';
import { lostFraction } from './lostFraction.ts';
import { isMainsRate } from './mainsEvidence.ts';
import type { RankedHypothesis } from './rankHypotheses.ts';
import { LEAST_SIGNIFICANCE, significance } from './significance.ts';

/** Without a second source of evidence no sound makes a figure surer than this. */
const HIGHEST_CONFIDENCE = 0.98;
/** Evidence beyond the threshold, nepers, at which a line no longer loses confidence for its weakness. */
const CLEAR_EXCESS = 1.5;
/** What could be another thing altogether makes no figure that needs no person. */
const HIGHEST_UNSURE_CONFIDENCE = 0.45;
/** Part of the time that may be lost before the median of the rest says nothing about the whole. */
const MOST_LOST_FRACTION = 0.2;
/** Event orders of one domain that sound, of four, when only one does. */
const ONE_OF_FOUR = 0.25;

/**
 * Probability that the speed is right within 1 %: that of its ratio among all others, less what a weak or restless
 * track takes away. A lone line could be anything that whines, a rate of the mains could be hum, and a track that was
 * lost while the sound went on has not seen all speeds.
 *
 * @returns [0, 0.98]
 */
export function confidenceOf(best: RankedHypothesis, { waveform }: FrontEnd): number {
  const strength = Math.min(1, 0.5 + (0.5 * (significance(best) - LEAST_SIGNIFICANCE)) / CLEAR_EXCESS);
  const calm = 1 / (1 + best.family.quality.restlessness);
  const isLost = lostFraction(best.family.refined.track, waveform) > MOST_LOST_FRACTION;
  const isDoubtful = isLost || isLoneLine(best) || isMainsRate(best);
  const highest = isDoubtful ? HIGHEST_UNSURE_CONFIDENCE : HIGHEST_CONFIDENCE;
  return Math.max(0, Math.min(highest, best.probability * strength * calm));
}

/** Whether nothing but one line was heard: no multiple, no rhythm in the loudness, no other order of the shaft. */
function isLoneLine({ waveform, envelope }: RankedHypothesis): boolean {
  const isAlone = waveform.hitFraction <= ONE_OF_FOUR && envelope.hitFraction <= ONE_OF_FOUR;
  return isAlone && Math.max(waveform.shaftShare, envelope.shaftShare) <= ONE_OF_FOUR;
}
