import * as z from 'zod/mini';
import { type FieldError, invalidFields } from '#server/errors.ts';

/** zod/mini carries no texts of its own; the schemas write theirs where the reader needs the range. */
z.config(z.locales.en());

/** More than this helps nobody, and keeps an answer small whatever was sent. */
const FIELD_ERROR_MAXIMUM_COUNT = 20;
const FIELD_NAME_MAXIMUM_CHARACTERS = 120;

/**
 * `value` as the schema describes it.
 *
 * @throws ServerError invalid-fields that names every field that is wrong, unknown ones included.
 */
export function parseFields<Schema extends z.ZodMiniType>(schema: Schema, value: unknown): z.infer<Schema> {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const fieldErrors = firstOfEachField(parsed.error.issues.flatMap(fieldErrorsOf));
  throw invalidFields(fieldErrors.slice(0, FIELD_ERROR_MAXIMUM_COUNT));
}

/** Of several rules that a value breaks, the first is told; the others often follow from it. */
function firstOfEachField(fieldErrors: readonly FieldError[]): FieldError[] {
  return fieldErrors.filter(
    ({ field }, index) => fieldErrors.findIndex((earlier) => earlier.field === field) === index,
  );
}

function fieldErrorsOf(issue: z.core.$ZodIssue): FieldError[] {
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map((key) => ({
      field: fieldName([...issue.path, key]),
      message: 'Is not a field of this call.',
    }));
  }
  return [{ field: fieldName(issue.path), message: issue.message }];
}

function fieldName(path: readonly PropertyKey[]): string {
  return path.map(String).join('.').slice(0, FIELD_NAME_MAXIMUM_CHARACTERS).toWellFormed();
}
