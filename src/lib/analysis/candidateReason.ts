import type { DomainFeatures } from './hypothesisFeatures.ts';
import type { RankedHypothesis } from './rankHypotheses.ts';

/** Evidence above this many nepers is worth a word. */
const PLAIN_NEPERS = 1.2;
const CLEAR_HIT_FRACTION = 0.7;
const MARKED_TURN_FRACTION = 0.3;
const MOSTLY = 0.6;
/** Ratios to the best candidate that have a name. */
const NAMED_RATIOS: readonly (readonly [number, string])[] = [
  [1 / 4, 'A quarter of the best speed'],
  [1 / 3, 'A third of the best speed'],
  [1 / 2, 'Half the best speed'],
  [2 / 3, 'Two thirds of the best speed'],
  [3 / 2, 'One and a half times the best speed'],
  [2, 'Twice the best speed'],
  [3, 'Three times the best speed'],
  [4, 'Four times the best speed'],
];
const SAME_RATIO = 0.01;

/**
 * Why a candidate is as likely as it is, as one sentence for people.
 *
 * @param best the most probable candidate; its own sentence says what speaks for it, those of others what speaks against them
 */
export function candidateReason(candidate: RankedHypothesis, best: RankedHypothesis): string {
  const waveform = praise(candidate.waveform, 'tone');
  const envelope = praise(candidate.envelope, 'loudness');
  const praises = [waveform, envelope].filter((clause) => clause !== null);
  if (marksTurns(candidate)) praises.push('uneven events mark every turn');
  if (candidate === best) {
    return praises.length > 0 ? `${sentence(praises)}.` : 'Its lines stand out of the noise only together.';
  }
  const objections = objectionsTo(candidate);
  const name = nameOf(candidate.shaftSpeedRpm / best.shaftSpeedRpm);
  if (objections.length > 0) return `${name}: ${objections.join(', and ')}.`;
  return `${name}: ${praises.length > 0 ? praises.join(', ') : 'weaker in every respect'}.`;
}

function nameOf(relative: number): string {
  const named = NAMED_RATIOS.find(([ratio]) => Math.abs(relative / ratio - 1) < SAME_RATIO);
  return named?.[1] ?? `${String(Number(relative.toPrecision(3)))} times the best speed`;
}

function praise(features: DomainFeatures, where: string): string | null {
  if (features.eventLevel < PLAIN_NEPERS) return null;
  const isWhole = features.hitFraction > CLEAR_HIT_FRACTION;
  return isWhole
    ? `the event rate and its multiples stand out of the ${where}`
    : `some multiples of the event rate stand out of the ${where}`;
}

function marksTurns({ waveform, envelope }: RankedHypothesis): boolean {
  return Math.max(waveform.shaftShare, envelope.shaftShare) > MARKED_TURN_FRACTION;
}

function objectionsTo({ waveform, envelope, family }: RankedHypothesis): string[] {
  const highest = (name: keyof DomainFeatures) => Math.max(waveform[name], envelope[name]);
  const objections: string[] = [];
  if (highest('strayLevel') > PLAIN_NEPERS || highest('strayShaftLevel') > PLAIN_NEPERS) {
    objections.push('lines between its events stay unexplained');
  }
  if (highest('eventAlternation') > PLAIN_NEPERS) objections.push('only some of its events would sound');
  if (highest('shaftAlternation') > PLAIN_NEPERS) objections.push('only some multiples of its turn sound');
  const isElsewhere = family.waveformPeaks.length > 0 ? waveform.unexplainedShare : envelope.unexplainedShare;
  if (isElsewhere > MOSTLY) objections.push('most lines of the sound lie elsewhere');
  return objections;
}

function sentence(clauses: readonly string[]): string {
  const text = clauses.join(', and ');
  return text.charAt(0).toUpperCase() + text.slice(1);
}
