import type { Transaction } from 'sequelize';
import { v7 as uuidV7 } from 'uuid';
import type { UpdateEvent } from '#lib/schemas/update.ts';
import { OutboxEvent } from '../models/OutboxEvent.ts';
import type { Recording } from '../models/Recording.ts';

/** Tells open pages that a person changed something about a recording, in the transaction that changes it. */
export async function announceEdit(
  { id, benchId, sessionId, state }: Pick<Recording, 'id' | 'benchId' | 'sessionId' | 'state'>,
  transaction: Transaction,
): Promise<void> {
  const payload: UpdateEvent = { topic: 'recording', recordingId: id, sessionId, benchId, status: state };
  const dedupeKey = Buffer.from(`recording:${id}:edit:${uuidV7()}`);
  await OutboxEvent.create({ benchId, topic: payload.topic, payload, dedupeKey }, { transaction });
}
