import type { JobsOptions } from 'bullmq';
import * as z from 'zod/mini';
import { identifier } from '#lib/schemas/fields.ts';

/**
 * The one table of jobs. Redis is a doorbell: a job says that something may be waiting, MariaDB says what. So a
 * job holds only an id, may be lost, doubled or come back from an old file, and nothing depends on it.
 */

/** BullMQ's queue; its keys in Redis begin with `bull:` and this name. */
export const QUEUE_NAME = 'ripplebench';

const DOORBELL: JobsOptions = {
  // BullMQ silently ignores an id that it still keeps as completed or failed.
  removeOnComplete: true,
  removeOnFail: true,
  attempts: 1,
};

export const JOBS = {
  analyseRecording: {
    payload: z.strictObject({ recordingId: identifier, generation: z.int().check(z.gte(1)) }),
    options: DOORBELL,
  },
} as const;

type JobName = keyof typeof JOBS;
export type JobPayload<Name extends JobName> = z.infer<(typeof JOBS)[Name]['payload']>;

/** One number a wish for an analysis and a fresh one for each ring again, so that no ring is taken for an old one. */
export function analyseRecordingJobId({ recordingId, generation }: JobPayload<'analyseRecording'>): string {
  return `${recordingId}_${String(generation)}`;
}
