import type { Transaction } from 'sequelize';
import type { RecordingStatus } from '#lib/schemas/recording.ts';
import type { UpdateEvent } from '#lib/schemas/update.ts';
import { OutboxEvent } from '../models/OutboxEvent.ts';

interface AnnouncedRecording {
  readonly recordingId: string;
  readonly benchId: string;
  readonly sessionId: string | null;
  readonly generation: number;
  readonly attempt: number;
}

/**
 * Tells open pages that a recording has changed its state, in the transaction that changes it. Wish, attempt and
 * state make the key, so however often a job runs, each step is told once.
 */
export async function announceRecording(
  { recordingId, benchId, sessionId, generation, attempt }: AnnouncedRecording,
  status: RecordingStatus,
  transaction: Transaction,
): Promise<void> {
  const payload: UpdateEvent = {
    topic: 'recording',
    recordingId,
    sessionId,
    benchId,
    status,
  };
  const dedupeKey = Buffer.from(`recording:${recordingId}:${String(generation)}:${String(attempt)}:${status}`);
  const event = { benchId, topic: payload.topic, payload, dedupeKey };
  await OutboxEvent.bulkCreate([event], {
    ignoreDuplicates: true,
    transaction,
  });
}
