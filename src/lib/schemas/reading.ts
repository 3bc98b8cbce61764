import * as z from 'zod/mini';
import { MOTIONS, NO_ROTATION_REASONS, READING_WARNINGS } from '../analysis/reading.ts';
import { SERIES_NAMES } from '../analysis/series.ts';
import { eventsPerTurn, expectedOrders, note, shaftSpeedRpm } from './fields.ts';
import { MAXIMUM_CHANNELS, MAXIMUM_DURATION_SECONDS } from './uploadLimits.ts';

const SECONDS_MESSAGE = `Must be a number from 0 to ${String(MAXIMUM_DURATION_SECONDS)} s.`;
const seconds = z
  .number(SECONDS_MESSAGE)
  .check(z.gte(0, SECONDS_MESSAGE), z.lte(MAXIMUM_DURATION_SECONDS, SECONDS_MESSAGE));

const LAST_CHANNEL = MAXIMUM_CHANNELS - 1;
const CHANNEL_MESSAGE = `Must be "auto" or a whole number from 0 to ${String(LAST_CHANNEL)}.`;
const channel = z.union(
  [z.literal('auto'), z.int().check(z.gte(0, CHANNEL_MESSAGE), z.lte(LAST_CHANNEL, CHANNEL_MESSAGE))],
  CHANNEL_MESSAGE,
);

/** Settings of one analysis; what is left out comes from the recording, then from its build. */
export const analyseAgainRequest = z.strictObject({
  eventsPerTurn: z.optional(eventsPerTurn),
  orders: z.optional(expectedOrders),
  rpmMin: z.optional(shaftSpeedRpm),
  rpmMax: z.optional(shaftSpeedRpm),
  channel: z.optional(channel),
  fromSeconds: z.optional(seconds),
  toSeconds: z.optional(seconds),
});
export type AnalyseAgainRequest = z.infer<typeof analyseAgainRequest>;

export const candidateView = z.object({ rpm: z.number(), score: z.number(), reason: z.string() });

/** The fields of one line of `npm run analyse -- --json`, without file, trend and error, plus the id. */
export const readingView = z.object({
  id: z.uuid(),
  status: z.enum(['measured', 'no-rotation']),
  motion: z.enum(MOTIONS),
  rpm: z.nullable(z.number()),
  rpmLow: z.nullable(z.number()),
  rpmHigh: z.nullable(z.number()),
  confidence: z.nullable(z.number()),
  eventHz: z.nullable(z.number()),
  eventsPerTurn: z.number(),
  candidates: z.array(candidateView),
  durationSeconds: z.number(),
  sampleRate: z.number(),
  engine: z.string(),
  elapsedMs: z.number(),
  reason: z.nullable(z.enum(NO_ROTATION_REASONS)),
  warnings: z.array(z.enum(READING_WARNINGS)),
  error: z.null(),
  settings: z.object({
    eventsPerTurn: z.number(),
    orders: z.array(z.number()),
    rpmMin: z.number(),
    rpmMax: z.number(),
    channel: z.union([z.literal('auto'), z.int()]),
    fromSeconds: z.nullable(z.number()),
    toSeconds: z.nullable(z.number()),
  }),
  seriesNames: z.array(z.enum(SERIES_NAMES)),
  createdAt: z.string(),
});
export type ReadingView = z.infer<typeof readingView>;

/** `confirm` keeps the machine's speed; `choose` takes another; `nothing-turning` and `record-again` discard it. */
export const REVIEW_DECISIONS = ['confirm', 'choose', 'nothing-turning', 'record-again'] as const;
export type ReviewDecision = (typeof REVIEW_DECISIONS)[number];

export const reviewRequest = z
  .strictObject({
    decision: z.enum(REVIEW_DECISIONS, `Must be one of ${REVIEW_DECISIONS.join(', ')}.`),
    rpm: z.optional(shaftSpeedRpm),
    reason: z._default(note, ''),
  })
  .check(
    z.refine((review) => (review.decision === 'choose') === (review.rpm !== undefined), {
      path: ['rpm'],
      error: 'Give rpm when another speed is chosen, and only then.',
    }),
  );
export type ReviewRequest = z.infer<typeof reviewRequest>;

export const reviewView = z.object({
  id: z.uuid(),
  readingId: z.uuid(),
  decision: z.enum(REVIEW_DECISIONS),
  rpm: z.nullable(z.number()),
  reason: z.string(),
  reviewer: z.object({ id: z.uuid(), name: z.string() }),
  createdAt: z.string(),
});
export type ReviewView = z.infer<typeof reviewView>;

/** Columns of numbers with their units; null is a gap. */
export const seriesView = z.object({
  name: z.enum(SERIES_NAMES),
  columns: z.record(z.string(), z.array(z.nullable(z.number()))),
  units: z.record(z.string(), z.string()),
});
export type SeriesView = z.infer<typeof seriesView>;
