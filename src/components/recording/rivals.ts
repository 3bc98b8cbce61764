import { numberText } from '#lib/format/numberText.ts';
import type { ReadingView } from '#lib/schemas/reading.ts';

type Candidate = ReadingView['candidates'][number];
type Relation = 'half' | 'double';

/** Two speeds are the same candidate within this fraction. */
const SAME_FRACTION = 0.01;
/** A rival below this fraction of the chosen weight is no equal of it. */
const CLEARLY_WEAKER_FRACTION = 0.8;
/** Below this a candidate is no rival. */
export const NEGLIGIBLE_SCORE = 0.01;

/** Whether two speeds are one candidate. */
export function isSameSpeed(rpm: number, otherRpm: number): boolean {
  return Math.abs(rpm - otherRpm) <= otherRpm * SAME_FRACTION;
}

/** How a candidate stands to the chosen speed, when that is worth a word. */
export function relationOf(rpm: number, chosenRpm: number): Relation | 'chosen' | null {
  if (isSameSpeed(rpm, chosenRpm)) return 'chosen';
  if (isSameSpeed(rpm, chosenRpm / 2)) return 'half';
  return isSameSpeed(rpm, chosenRpm * 2) ? 'double' : null;
}

/** Why the chosen speed is not half or double of itself, one sentence each. */
export function whyNotTexts({ candidates, settings }: ReadingView, chosenRpm: number): string[] {
  const chosen = candidates.find(({ rpm }) => isSameSpeed(rpm, chosenRpm));
  return (['half', 'double'] as const).map((relation) => {
    const rpm = relation === 'half' ? chosenRpm / 2 : chosenRpm * 2;
    const name = `${relation === 'half' ? 'Half' : 'Double'} (${numberText(rpm, 0)} rpm)`;
    if (rpm < settings.rpmMin || rpm > settings.rpmMax) return `${name} lies outside the allowed range.`;
    return `${name}${weightText(
      candidates.find((candidate) => isSameSpeed(candidate.rpm, rpm)),
      chosen,
    )}`;
  });
}

/** Whether half the chosen speed weighs about as much as the speed itself, so that the sound alone does not decide. */
export function isHalfPossible({ candidates }: ReadingView, chosenRpm: number): boolean {
  const chosen = candidates.find(({ rpm }) => isSameSpeed(rpm, chosenRpm));
  const half = candidates.find(({ rpm }) => isSameSpeed(rpm, chosenRpm / 2));
  return half !== undefined && half.score >= NEGLIGIBLE_SCORE && !isClearlyWeaker(half, chosen);
}

function isClearlyWeaker(rival: Candidate, chosen: Candidate | undefined): boolean {
  return chosen !== undefined && rival.score < chosen.score * CLEARLY_WEAKER_FRACTION;
}

function weightText(rival: Candidate | undefined, chosen: Candidate | undefined): string {
  if (rival === undefined) return ' explains too few lines to be a candidate.';
  const why = ownReason(rival.reason);
  if (rival.score < NEGLIGIBLE_SCORE) return ` is as good as ruled out: ${why}`;
  if (chosen === undefined) return ` has a weight of ${scoreText(rival.score)}: ${why}`;
  const weights = `${scoreText(rival.score)} against ${scoreText(chosen.score)}`;
  if (rival.score > chosen.score) return ` weighs more, ${weights}: ${why}`;
  if (isClearlyWeaker(rival, chosen)) return ` weighs ${weights}: ${why}`;
  return ` stays possible, ${weights}: ${why}`;
}

/** A score as people read it: never 0.00 and never 1.00, for nothing is certain. */
export function scoreText(score: number): string {
  if (score < NEGLIGIBLE_SCORE) return 'under 0.01';
  return score > 1 - NEGLIGIBLE_SCORE ? 'over 0.99' : numberText(score, 2);
}

/** The reason without the words that say how the candidate stands to the best one: the sentence around it says that. */
function ownReason(reason: string): string {
  const own = reason.replace(/^[^:]*best speed: /u, '');
  return own.charAt(0).toLowerCase() + own.slice(1);
}
