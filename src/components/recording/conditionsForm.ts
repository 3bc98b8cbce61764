import { parseNumber } from '#lib/format/parseNumber.ts';
import { plainNumberText } from '#lib/format/numberText.ts';
import { updateRecordingRequest, type RecordingView, type UpdateRecordingRequest } from '#lib/schemas/recording.ts';

/** The blanks of the conditions sentence as typed. */
export interface ConditionsForm {
  readonly buildId: string;
  readonly supplyVolts: string;
  readonly currentAmps: string;
  readonly note: string;
}

/** What stands in the blanks for a recording. */
export function formOf({ build, supplyVolts, currentAmps, note }: RecordingView): ConditionsForm {
  return {
    buildId: build?.id ?? '',
    supplyVolts: supplyVolts === null ? '' : plainNumberText(supplyVolts),
    currentAmps: currentAmps === null ? '' : plainNumberText(currentAmps),
    note: note ?? '',
  };
}

export type CheckedForm =
  | { readonly isValid: true; readonly changes: UpdateRecordingRequest }
  | { readonly isValid: false; readonly errors: Partial<Record<keyof ConditionsForm, string>> };

/** The changes that the blanks stand for, or what is wrong with which blank. An empty blank clears the value. */
export function checkForm(form: ConditionsForm): CheckedForm {
  const parsed = updateRecordingRequest.safeParse({
    buildId: form.buildId || null,
    supplyVolts: parseNumber(form.supplyVolts),
    currentAmps: parseNumber(form.currentAmps),
    note: form.note.trim() || null,
  });
  if (parsed.success) return { isValid: true, changes: parsed.data };
  return {
    isValid: false,
    errors: Object.fromEntries(parsed.error.issues.map((issue) => [String(issue.path[0]), issue.message])),
  };
}

/** Whether anything in the blanks differs. */
export function isSameForm(one: ConditionsForm, other: ConditionsForm): boolean {
  return (Object.keys(one) as (keyof ConditionsForm)[]).every((name) => one[name] === other[name]);
}
