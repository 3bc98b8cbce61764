import { plainNumberText } from '#lib/format/numberText.ts';
import { parseNumber } from '#lib/format/parseNumber.ts';
import type { SessionConditions } from '#lib/schemas/session.ts';

/** The conditions of a session as they are typed. */
export interface ConditionTexts {
  readonly supplyVolts: string;
  readonly load: string;
  readonly ambientCelsius: string;
  readonly note: string;
}

export const NO_CONDITION_TEXTS: ConditionTexts = { supplyVolts: '', load: '', ambientCelsius: '', note: '' };

/** What stands in the boxes for conditions that are known already. */
export function conditionTexts({ supplyVolts, load, ambientCelsius, note }: SessionConditions): ConditionTexts {
  return {
    supplyVolts: supplyVolts === null ? '' : plainNumberText(supplyVolts),
    load: load ?? '',
    ambientCelsius: ambientCelsius === null ? '' : plainNumberText(ambientCelsius),
    note: note ?? '',
  };
}

/** The conditions that the boxes mean; NaN for a figure that is none, so that the schema refuses it. */
export function conditionsOf({ supplyVolts, load, ambientCelsius, note }: ConditionTexts): SessionConditions {
  return {
    supplyVolts: parseNumber(supplyVolts),
    load: load.trim() || null,
    ambientCelsius: parseNumber(ambientCelsius),
    note: note.trim() || null,
  };
}
