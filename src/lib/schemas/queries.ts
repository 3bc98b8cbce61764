import * as z from 'zod/mini';
import { identifier } from './fields.ts';
import { PAGE_DEFAULT_COUNT, PAGE_MAXIMUM_COUNT } from './page.ts';
import { RECORDING_STATUSES } from './recording.ts';

/** Query strings of the lists: text that is read strictly, as one spelling of one value. */

const LIMIT_MESSAGE = `Must be a whole number from 1 to ${String(PAGE_MAXIMUM_COUNT)}.`;
const CURSOR_MAXIMUM_CHARACTERS = 200;
const CURSOR_MESSAGE = 'Must be the nextCursor of the page before.';

const limit = z.pipe(
  z.string().check(
    z.regex(/^[1-9]\d{0,2}$/, LIMIT_MESSAGE),
    z.refine((text) => Number(text) <= PAGE_MAXIMUM_COUNT, LIMIT_MESSAGE),
  ),
  z.transform(Number),
);

const truth = z.pipe(
  z.enum(['true', 'false'], 'Must be true or false.'),
  z.transform((text) => text === 'true'),
);

const pageQuery = {
  limit: z._default(limit, PAGE_DEFAULT_COUNT),
  /** `nextCursor` of the page before; says nothing else. */
  cursor: z.optional(
    z.string().check(z.minLength(1, CURSOR_MESSAGE), z.maxLength(CURSOR_MAXIMUM_CHARACTERS, CURSOR_MESSAGE)),
  ),
};

export const listOfBenchQuery = z.strictObject({ ...pageQuery, benchId: z.optional(identifier) });

export const listRecordingsQuery = z.strictObject({
  ...pageQuery,
  benchId: z.optional(identifier),
  sessionId: z.optional(identifier),
  buildId: z.optional(identifier),
  status: z.optional(z.enum(RECORDING_STATUSES, `Must be one of ${RECORDING_STATUSES.join(', ')}.`)),
  needsPerson: z.optional(truth),
});
