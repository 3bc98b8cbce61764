import type { UpdateRecordingRequest } from '#lib/schemas/recording.ts';
import { inTransaction } from '../database/inTransaction.ts';
import { forbidden } from '../errors.ts';
import { Recording } from '../models/Recording.ts';
import type { RecordingWithRelations } from '../models/recordingDetails.ts';
import type { Actor } from '../policies/actor.ts';
import { recordingPolicy } from '../policies/recordingPolicy.ts';
import { announceEdit } from './announceEdit.ts';
import { audit } from './audit.ts';
import { getRecording } from './getRecording.ts';
import { loadMotor } from './placeUpload.ts';
import { loadReadableRecording, type RecordingDetails } from './recordingDetails.ts';

interface UpdateRecording {
  readonly actor: Actor;
  readonly recordingId: string;
  readonly changes: UpdateRecordingRequest;
}

/**
 * Changes the conditions that are named. The reading stays: what another build would mean for the speed is found
 * out by analysing again.
 *
 * @throws ServerError not-found, forbidden, invalid-fields
 */
export async function updateRecording({ actor, recordingId, changes }: UpdateRecording): Promise<RecordingDetails> {
  const recording = await loadReadableRecording(actor, recordingId);
  if (!recordingPolicy.canEdit(actor, recording)) throw forbidden();
  const columns = await columnsOf(recording, changes);
  const { id, benchId } = recording;
  await inTransaction(async (transaction) => {
    await Recording.update(columns, { where: { id, benchId }, transaction });
    const changed = await Recording.findOne({ where: { id, benchId }, transaction, rejectOnEmpty: true });
    await announceEdit(changed, transaction);
    const object = { type: 'recording', id };
    await audit({ action: 'recording.changed', accountId: actor.account.id, benchId, object }, transaction);
  });
  return getRecording({ actor, recordingId });
}

/** What is left out stays; null clears. A build that is named anew is meant as it is now. */
async function columnsOf({ benchId }: RecordingWithRelations, changes: UpdateRecordingRequest) {
  const { sessionId, buildId } = changes;
  const { build } = await loadMotor(benchId, { sessionId, buildId });
  const given = Object.fromEntries(Object.entries(changes).filter(([, value]) => value !== undefined));
  return buildId === undefined
    ? given
    : { ...given, buildRevision: buildId === null ? null : (build?.revision ?? null) };
}
