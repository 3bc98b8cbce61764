import type { ReviewRequest } from '#lib/schemas/reading.ts';
import { inTransaction } from '../database/inTransaction.ts';
import { forbidden, notFound } from '../errors.ts';
import { Reading } from '../models/Reading.ts';
import { Review, type ReviewWithReviewer } from '../models/Review.ts';
import { readableBenchIds } from '../policies/abilities.ts';
import type { Actor } from '../policies/actor.ts';
import { recordingPolicy } from '../policies/recordingPolicy.ts';
import { announceEdit } from './announceEdit.ts';
import { audit } from './audit.ts';
import { loadReadableRecording } from './recordingDetails.ts';

interface ReviewReading {
  readonly actor: Actor;
  readonly readingId: string;
  readonly request: ReviewRequest;
}

/**
 * Adds what a person says about a reading. The reading stays as the machine made it, earlier reviews stay too, and
 * the newest counts.
 *
 * @throws ServerError not-found, forbidden
 */
export async function reviewReading({ actor, readingId, request }: ReviewReading): Promise<ReviewWithReviewer> {
  const where = { id: readingId, benchId: readableBenchIds(actor) };
  const reading = await Reading.findOne({ where, attributes: ['id', 'recordingId'] });
  if (reading === null) throw notFound('reading');
  const recording = await loadReadableRecording(actor, reading.recordingId);
  if (!recordingPolicy.canReview(actor, recording)) throw forbidden();
  const { id: recordingId, benchId } = recording;
  const id = await inTransaction(async (transaction) => {
    const { decision, rpm, reason } = request;
    const row = { benchId, recordingId, readingId, reviewerId: actor.account.id, decision, reason };
    const created = await Review.create({ ...row, shaftSpeedRpm: rpm ?? null }, { transaction });
    await announceEdit(recording, transaction);
    const object = { type: 'reading', id: readingId };
    const line = { action: 'reading.reviewed', accountId: actor.account.id, benchId, object, details: { decision } };
    await audit(line, transaction);
    return created.id;
  });
  return Review.loadWithReviewer({ id, benchId });
}
