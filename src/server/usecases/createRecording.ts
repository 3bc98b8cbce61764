import { availableParallelism } from 'node:os';
import { type Transaction, UniqueConstraintError } from 'sequelize';
import { v7 as uuidV7 } from 'uuid';
import { IDEMPOTENCY_KEY_MAXIMUM_CHARACTERS, type UploadFields } from '#lib/schemas/recording.ts';
import { inTransaction } from '../database/inTransaction.ts';
import { forbidden, invalidFields, ServerError } from '../errors.ts';
import { createGate } from '../media/createGate.ts';
import { Membership } from '../models/Membership.ts';
import { Recording } from '../models/Recording.ts';
import { roleHasAbility } from '../policies/abilities.ts';
import type { Actor } from '../policies/actor.ts';
import { ringWorkers } from '../queue/ringWorkers.ts';
import { blobStorage } from '../storage/blobStorage.ts';
import type { BlobStorage } from '../storage/storage.ts';
import { announceRecording } from './announceRecording.ts';
import { audit } from './audit.ts';
import { examineUpload } from './examineUpload.ts';
import { placeUpload, type UploadPlace } from './placeUpload.ts';
import type { ReceivedUpload } from './receivedUpload.ts';

interface CreateRecordingOptions {
  readonly actor: Actor;
  /** Is committed or discarded here, whatever happens. */
  readonly upload: ReceivedUpload;
  readonly fields: UploadFields;
  readonly idempotencyKey: string | null;
  readonly storage?: BlobStorage;
}

export interface CreatedRecording {
  readonly recording: Recording;
  /** False when the same key had brought the same bytes before. */
  readonly created: boolean;
}

/** A burst of uploads waits here, not in the connection pool, which others need. */
const transactionGate = createGate(Math.max(2, availableParallelism()));

/**
 * Takes an upload for good: when this returns, file and row survive a power cut. The order is file first, row
 * second, so that a crash leaves at worst a file without a row, which the sweeper finds.
 *
 * @throws ServerError; then there is neither file nor row, unless the connection broke at COMMIT, where a second
 *   upload with the same key finds out
 */
export async function createRecording(options: CreateRecordingOptions): Promise<CreatedRecording> {
  const { actor, upload, fields } = options;
  const storage = options.storage ?? blobStorage();
  const idempotencyKey = keyBytes(options.idempotencyKey);
  try {
    const place = await placeUpload({ actor, fields, idempotencyKey, byteCount: upload.byteCount });
    if (place.earlier) return earlierOrRefused(place.earlier, upload);
    const media = await examineUpload(upload.temporary);
    const blobId = await storage.commit(upload.temporary);
    return await storeRow({
      place,
      row: rowOf({ ...options, place, media, blobId, idempotencyKey }),
      actor,
      upload,
      storage,
    });
  } finally {
    await upload.temporary.discard();
  }
}

interface StoreRowOptions {
  readonly place: UploadPlace;
  readonly row: ReturnType<typeof rowOf>;
  readonly actor: Actor;
  readonly upload: ReceivedUpload;
  readonly storage: BlobStorage;
}

async function storeRow(options: StoreRowOptions): Promise<CreatedRecording> {
  const { row, upload, storage } = options;
  const progress = { isWritten: false };
  try {
    const result = await transactionGate(() =>
      inTransaction(async (transaction) => {
        progress.isWritten = false;
        const created = await writeRow(options, transaction);
        progress.isWritten = created.created;
        return created;
      }),
    );
    if (result.created) void ringWorkers({ recordingId: row.id, generation: 1 });
    else await storage.remove(row.blobId);
    return result;
  } catch (error) {
    // An error after everything was written came with COMMIT: the row may be there, so its file must stay.
    if (!progress.isWritten) await storage.remove(row.blobId);
    const earlier = error instanceof UniqueConstraintError ? await loadEarlier(row) : null;
    if (earlier === null) throw error;
    return earlierOrRefused(earlier, upload);
  }
}

async function writeRow({ row, actor, upload }: StoreRowOptions, transaction: Transaction): Promise<CreatedRecording> {
  await requireStillContributing(actor, row.benchId, transaction);
  const earlier = await loadEarlier(row, transaction);
  if (earlier !== null) return earlierOrRefused(earlier, upload);
  const { benchId, sha256 } = row;
  const first = await Recording.loadOldestBySha256({ benchId, sha256 }, transaction);
  const recording = await Recording.create({ ...row, duplicateOf: first?.id ?? null }, { transaction });
  const { id: recordingId, sessionId } = recording;
  await announceRecording({ recordingId, benchId, sessionId, generation: 1, attempt: 0 }, 'queued', transaction);
  await audit(
    {
      action: 'recording.created',
      accountId: actor.account.id,
      benchId,
      object: { type: 'recording', id: recordingId },
      details: { byteCount: upload.byteCount },
    },
    transaction,
  );
  return { recording, created: true };
}

/**
 * The role may have been taken while the file came in. The lock also lines up the uploads of one person, so that of
 * two with the same key or the same bytes the second sees the first.
 */
async function requireStillContributing(actor: Actor, benchId: string, transaction: Transaction): Promise<void> {
  const membership = await Membership.findOne({
    where: { benchId, accountId: actor.account.id },
    include: [{ association: 'account', where: { disabledAt: null }, attributes: [] }],
    transaction,
    lock: { level: transaction.LOCK.UPDATE, of: Membership },
  });
  if (membership === null || !roleHasAbility(membership.role, 'contribute')) throw forbidden();
}

async function loadEarlier(
  { benchId, idempotencyKey }: { benchId: string; idempotencyKey: Buffer | null },
  transaction?: Transaction,
): Promise<Recording | null> {
  return idempotencyKey && Recording.loadByIdempotencyKey({ benchId, idempotencyKey }, transaction);
}

function earlierOrRefused(earlier: Recording, upload: ReceivedUpload): CreatedRecording {
  if (earlier.sha256.equals(upload.sha256)) return { recording: earlier, created: false };
  throw new ServerError({
    code: 'key-reused',
    detail: 'This Idempotency-Key was used for another file. Send a new key with a new file.',
  });
}

interface RowOptions extends Omit<CreateRecordingOptions, 'idempotencyKey'> {
  readonly place: UploadPlace;
  readonly media: Awaited<ReturnType<typeof examineUpload>>;
  readonly blobId: string;
  readonly idempotencyKey: Buffer | null;
}

function rowOf({ actor, upload, fields, place, media, blobId, idempotencyKey }: RowOptions) {
  const { benchId, sessionId, buildId, buildRevision } = place;
  return {
    id: uuidV7(),
    ...{ benchId, sessionId, buildId, buildRevision, blobId, idempotencyKey, ...media },
    uploadedBy: actor.account.id,
    fileName: upload.fileName,
    byteCount: upload.byteCount,
    sha256: upload.sha256,
    eventsPerTurn: fields.eventsPerTurn ?? null,
    orders: fields.orders ?? null,
    minimumRpm: fields.rpmMin ?? null,
    maximumRpm: fields.rpmMax ?? null,
    supplyVolts: fields.supplyVolts ?? null,
    currentAmps: fields.currentAmps ?? null,
    note: fields.note ?? null,
  };
}

/** @throws ServerError invalid-fields */
export function keyBytes(idempotencyKey: string | null): Buffer | null {
  if (idempotencyKey === null) return null;
  if (idempotencyKey !== '' && idempotencyKey.length <= IDEMPOTENCY_KEY_MAXIMUM_CHARACTERS) {
    return Buffer.from(idempotencyKey);
  }
  const message = `Must have 1 to ${String(IDEMPOTENCY_KEY_MAXIMUM_CHARACTERS)} characters.`;
  throw invalidFields([{ field: 'Idempotency-Key', message }]);
}
