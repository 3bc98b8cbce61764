import * as z from 'zod/mini';
import { geometry } from './build.ts';
import { currentAmps, eventsPerTurn, expectedOrders, identifier, note, shaftSpeedRpm, supplyVolts } from './fields.ts';
import { readingView, reviewView } from './reading.ts';

export const RECORDING_STATUSES = ['queued', 'working', 'done', 'failed'] as const;
export type RecordingStatus = (typeof RECORDING_STATUSES)[number];

/** Longest Idempotency-Key that a client may send. */
export const IDEMPOTENCY_KEY_MAXIMUM_CHARACTERS = 128;

/** The text fields that go with a file, after they were read as numbers. */
export const uploadFields = z
  .strictObject({
    benchId: z.optional(identifier),
    sessionId: z.optional(identifier),
    buildId: z.optional(identifier),
    eventsPerTurn: z.optional(eventsPerTurn),
    orders: z.optional(expectedOrders),
    rpmMin: z.optional(shaftSpeedRpm),
    rpmMax: z.optional(shaftSpeedRpm),
    supplyVolts: z.optional(supplyVolts),
    currentAmps: z.optional(currentAmps),
    note: z.optional(note),
  })
  .check(
    z.refine((fields) => (fields.rpmMin ?? 0) < (fields.rpmMax ?? Number.POSITIVE_INFINITY), {
      path: ['rpmMax'],
      error: 'Must be above rpmMin.',
    }),
  );
export type UploadFields = z.infer<typeof uploadFields>;

/** Conditions of a recording; null clears a value. */
export const updateRecordingRequest = z.strictObject({
  sessionId: z.optional(z.nullable(identifier)),
  buildId: z.optional(z.nullable(identifier)),
  supplyVolts: z.optional(z.nullable(supplyVolts)),
  currentAmps: z.optional(z.nullable(currentAmps)),
  note: z.optional(z.nullable(note)),
});
export type UpdateRecordingRequest = z.infer<typeof updateRecordingRequest>;

export const uploadedRecordingView = z.object({
  id: z.uuid(),
  fileName: z.string(),
  sha256: z.string(),
  status: z.enum(RECORDING_STATUSES),
  duplicateOf: z.nullable(z.uuid()),
});
export const uploadResponse = z.object({ recordings: z.array(uploadedRecordingView) });
export type UploadResponse = z.infer<typeof uploadResponse>;

export const recordingView = z.object({
  id: z.uuid(),
  benchId: z.uuid(),
  sessionId: z.nullable(z.uuid()),
  fileName: z.string(),
  byteCount: z.number(),
  sha256: z.string(),
  status: z.enum(RECORDING_STATUSES),
  error: z.nullable(z.object({ code: z.string(), message: z.string() })),
  duplicateOf: z.nullable(z.uuid()),
  build: z.nullable(
    z.object({ id: z.uuid(), name: z.string(), revision: z.int(), geometry, eventsPerTurn: z.number() }),
  ),
  supplyVolts: z.nullable(z.number()),
  currentAmps: z.nullable(z.number()),
  note: z.nullable(z.string()),
  /** What the file says of itself; null where only decoding can tell. */
  media: z.object({
    container: z.string(),
    codec: z.nullable(z.string()),
    sampleRateHz: z.nullable(z.number()),
    channelCount: z.nullable(z.int()),
    durationSeconds: z.nullable(z.number()),
  }),
  uploadedBy: z.object({ id: z.uuid(), name: z.string() }),
  createdAt: z.string(),
  /** The current reading; null until the first is done. */
  reading: z.nullable(readingView),
  /** What a person said about the current reading. */
  review: z.nullable(reviewView),
  /** Whether it waits for someone: failed, or unsure and not yet reviewed. */
  needsPerson: z.boolean(),
  abilities: z.object({ canReview: z.boolean(), canEdit: z.boolean(), canAnalyseAgain: z.boolean() }),
});
export type RecordingView = z.infer<typeof recordingView>;
