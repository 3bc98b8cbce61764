import { numberText } from '#lib/format/numberText.ts';
import type { ReadingView } from '#lib/schemas/reading.ts';

type Candidate = ReadingView['candidates'][number];
type Relation = 'half' | 'double';

/** Two speeds are the same candidate within this fraction. */
const SAME_FRACTION = 0.01;
const CLEARLY_WEAKER_SCORE = 0.8;

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

function weightText(rival: Candidate | undefined, chosen: Candidate | undefined): string {
  if (rival === undefined) return ' explains too few lines to be a candidate.';
  if (chosen !== undefined && rival.score > chosen.score) {
    return ` weighs more, ${numberText(rival.score, 2)} against ${numberText(chosen.score, 2)}: ${lowered(rival.reason)}`;
  }
  const isWeaker = chosen !== undefined && rival.score < chosen.score * CLEARLY_WEAKER_SCORE;
  if (isWeaker)
    return ` weighs ${numberText(rival.score, 2)} against ${numberText(chosen.score, 2)}: ${lowered(rival.reason)}`;
  return ` stays possible with a weight of ${numberText(rival.score, 2)}: ${lowered(rival.reason)}`;
}

function lowered(sentence: string): string {
  return sentence.charAt(0).toLowerCase() + sentence.slice(1);
}
