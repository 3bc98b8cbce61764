import * as z from 'zod/mini';
import { describe, expect, it } from 'vitest';
import { parseFields } from '#http/parseFields.ts';

const schema = z.strictObject({
  name: z.string().check(z.minLength(2, 'Too short.'), z.regex(/^\w+$/, 'Not a word.')),
  part: z.strictObject({ count: z.int() }),
});

function fieldErrorsOf(value: unknown) {
  try {
    parseFields(schema, value);
    return null;
  } catch (error) {
    return (error as { fieldErrors: { field: string; message: string }[] }).fieldErrors;
  }
}

describe('parseFields', () => {
  it('returns what fits', () => {
    expect(parseFields(schema, { name: 'ab', part: { count: 3 } })).toEqual({ name: 'ab', part: { count: 3 } });
  });

  it('names each wrong field once, by its path, with the first rule that it breaks', () => {
    expect(fieldErrorsOf({ name: '-', part: { count: 1.5 } })).toEqual([
      { field: 'name', message: 'Too short.' },
      { field: 'part.count', message: 'Invalid input: expected int, received number' },
    ]);
  });

  it('names unknown fields at every depth, __proto__ too', () => {
    const value = JSON.parse('{"name":"ab","part":{"count":1,"x":1},"__proto__":{}}') as unknown;
    expect(
      fieldErrorsOf(value)
        ?.map(({ field }) => field)
        .sort(),
    ).toEqual(['__proto__', 'part.x']);
  });

  it('has an answer for a body that is no object', () => {
    for (const value of [null, 1, 'text', []]) expect(fieldErrorsOf(value)).toHaveLength(1);
  });

  it('names at most 20 fields, with at most 120 characters, and no half of a character', () => {
    const crowd = Object.fromEntries(
      Array.from({ length: 500 }, (_, index) => [`${'x'.repeat(118)}${String(index)}😀`, 1]),
    );
    const errors = fieldErrorsOf({ name: 'ab', part: { count: 1 }, ...crowd }) ?? [];
    expect(errors).toHaveLength(20);
    for (const { field } of errors) expect([field.length <= 120, field.isWellFormed()]).toEqual([true, true]);
  });
});
