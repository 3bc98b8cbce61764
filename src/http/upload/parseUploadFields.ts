import { parseNumber } from '#lib/format/parseNumber.ts';
import { type UploadFields, uploadFields } from '#lib/schemas/recording.ts';
import { invalidFields } from '#server/errors.ts';
import { parseFields } from '../parseFields.ts';

/** The text fields of a form by name; a name that was sent twice holds a list. */
export type FormTexts = Readonly<Record<string, unknown>>;

const NUMBER_FIELDS: readonly string[] = ['eventsPerTurn', 'rpmMin', 'rpmMax', 'supplyVolts', 'currentAmps'];
/** What a decoder of UTF-8 puts in the place of bytes that are none. */
const REPLACEMENT_CHARACTER = '\uFFFD';

/**
 * The fields that go with a file. Numbers are plain decimals with point or comma, `orders` is a list with commas or
 * in JSON; an empty field is one that was not filled in.
 *
 * @throws ServerError invalid-fields that names every field that is wrong
 */
export function parseUploadFields(texts: FormTexts): UploadFields {
  const given = Object.entries(texts).filter(([, text]) => text !== '');
  const unreadable = given.filter(([, text]) => typeof text !== 'string' || text.includes(REPLACEMENT_CHARACTER));
  if (unreadable.length > 0) {
    throw invalidFields(unreadable.map(([field]) => ({ field, message: 'Must be given once, as text in UTF-8.' })));
  }
  return parseFields(
    uploadFields,
    Object.fromEntries(given.map(([name, text]) => [name, valueOf(name, String(text))])),
  );
}

function valueOf(name: string, text: string): unknown {
  if (NUMBER_FIELDS.includes(name)) return parseNumber(text);
  return name === 'orders' ? listOf(text) : text;
}

function listOf(text: string): unknown {
  if (!text.trimStart().startsWith('[')) return text.split(',').map((item) => parseNumber(item));
  try {
    return JSON.parse(text);
  } catch {
    return text;
  }
}
