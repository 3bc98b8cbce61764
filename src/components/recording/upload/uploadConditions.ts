import { parseNumber } from '#lib/format/parseNumber.ts';
import { uploadFields, type UploadFields } from '#lib/schemas/recording.ts';

/** What stands in the blanks of the conditions sentence, as typed. */
export interface UploadConditions {
  readonly sessionId: string;
  readonly buildId: string;
  readonly eventsPerTurn: string;
  readonly supplyVolts: string;
  readonly currentAmps: string;
  readonly note: string;
}

export const NO_CONDITIONS: UploadConditions = {
  sessionId: '',
  buildId: '',
  eventsPerTurn: '',
  supplyVolts: '',
  currentAmps: '',
  note: '',
};

export type ConditionErrors = Partial<Record<keyof UploadConditions, string>>;

export type CheckedConditions =
  | { readonly isValid: true; readonly fields: UploadFields }
  | { readonly isValid: false; readonly errors: ConditionErrors };

/** The fields that go with each file, or what is wrong with which blank. Empty blanks are left out. */
export function checkConditions(benchId: string, conditions: UploadConditions): CheckedConditions {
  const { sessionId, buildId, eventsPerTurn, supplyVolts, currentAmps, note } = conditions;
  const given = Object.entries({
    benchId,
    sessionId: sessionId || null,
    buildId: buildId || null,
    // A build knows its own.
    eventsPerTurn: buildId === '' ? parseNumber(eventsPerTurn) : null,
    supplyVolts: parseNumber(supplyVolts),
    currentAmps: parseNumber(currentAmps),
    note: note.trim() || null,
  }).filter(([, value]) => value !== null);
  const parsed = uploadFields.safeParse(Object.fromEntries(given));
  if (parsed.success) return { isValid: true, fields: parsed.data };
  return {
    isValid: false,
    errors: Object.fromEntries(parsed.error.issues.map((issue) => [String(issue.path[0]), issue.message])),
  };
}
