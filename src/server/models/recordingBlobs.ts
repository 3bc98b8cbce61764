import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../database/connection.ts';
import type { QueuedRecording } from './recordingClaims.ts';

/** What the sweeper asks about rows and their files. */

export interface RecordingWithBlob extends QueuedRecording {
  readonly blobId: string;
}

/** @returns those of the blobs that a recording names */
export async function listNamedBlobIds(blobIds: readonly string[]): Promise<Set<string>> {
  if (blobIds.length === 0) return new Set();
  const rows = await database.query<{ blobId: string }>(
    `/* every bench: files do not know their bench */
     SELECT blob_id AS blobId FROM recordings WHERE blob_id IN (:blobIds)`,
    { type: QueryTypes.SELECT, replacements: { blobIds: [...blobIds] } },
  );
  return new Set(rows.map(({ blobId }) => blobId));
}

/** Recordings page by page, in the order of their ids; those already known to have lost their file are left out. */
export function listWithBlobs(afterId: string, limitCount: number): Promise<RecordingWithBlob[]> {
  return database.query<RecordingWithBlob>(
    `/* every bench: the sweeper compares all rows with the storage */
     SELECT id AS recordingId, bench_id AS benchId, session_id AS sessionId, generation, attempt, blob_id AS blobId
     FROM recordings WHERE id > :afterId AND NOT (state = 'failed' AND error_code <=> 'file-missing')
     ORDER BY id LIMIT :limitCount`,
    { type: QueryTypes.SELECT, replacements: { afterId, limitCount } },
  );
}

/**
 * Marks a recording whose file is gone. One that is being analysed is left to its worker, which has found out or
 * still holds the file open.
 *
 * @returns whether the row was changed
 */
export async function failMissingFile(
  { recordingId, benchId, generation }: QueuedRecording,
  message: string,
  transaction: Transaction,
): Promise<boolean> {
  const [, rowCount] = await database.query(
    `UPDATE recordings SET state = 'failed', error_code = 'file-missing', error_message = :message,
       generation = generation + 1, updated_at = NOW(3)
     WHERE id = :recordingId AND bench_id = :benchId AND generation = :generation AND state <> 'working'`,
    { type: QueryTypes.UPDATE, replacements: { recordingId, benchId, generation, message }, transaction },
  );
  return rowCount === 1;
}
