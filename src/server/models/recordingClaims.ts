import { QueryTypes, type Transaction } from 'sequelize';
import { database } from '../database/connection.ts';

/**
 * The statements that move a recording through the queue. Each is a conditional UPDATE that says which state it
 * expects, so of two workers that want the same row one changes it and the other sees zero rows. Times of leases
 * are database time: the clocks of the workers do not matter.
 */

/** A recording as the queue sees it. */
export interface QueuedRecording {
  readonly recordingId: string;
  readonly benchId: string;
  readonly sessionId: string | null;
  /** Number of the wish for an analysis; grows with each return to the queue and each ring again. */
  readonly generation: number;
  /** Claims so far that ended without a result. */
  readonly attempt: number;
}

/** The right to analyse one recording, good as long as the row still carries the fence token. */
export interface RecordingClaim extends QueuedRecording {
  /** 16 random bytes; a worker that was replaced cannot write with its old token. */
  readonly fenceToken: Buffer;
}

const COLUMNS = 'id AS recordingId, recordings.bench_id AS benchId, session_id AS sessionId, generation, attempt';
const END_OF_CLAIM = 'fence_token = NULL, lease_expires_at = NULL';

type Values = Readonly<Record<string, string | number | Buffer>>;

function select<Row extends object>(sql: string, replacements: Values, transaction?: Transaction): Promise<Row[]> {
  return database.query<Row>(sql, { type: QueryTypes.SELECT, replacements, transaction: transaction ?? null });
}

async function changedRowCount(sql: string, replacements: Values, transaction?: Transaction): Promise<number> {
  const options = { type: QueryTypes.UPDATE, replacements, transaction: transaction ?? null } as const;
  const [, rowCount] = await database.query(sql, options);
  return rowCount;
}

/**
 * The next recordings to claim, fairest first: of the bench with the fewest running ones, interactive before
 * batch, then of the bench that has waited longest for a turn, then the oldest.
 */
export function listNextQueued(limitCount: number): Promise<QueuedRecording[]> {
  return select(
    `/* every bench: a fair turn for each */
     SELECT ${COLUMNS} FROM recordings
     LEFT JOIN (SELECT bench_id, COUNT(*) AS running_count FROM recordings WHERE state = 'working' GROUP BY bench_id)
       AS busy ON busy.bench_id = recordings.bench_id
     LEFT JOIN bench_turns ON bench_turns.bench_id = recordings.bench_id
     WHERE state = 'queued'
     ORDER BY COALESCE(running_count, 0), priority, served_at, queued_at, id
     LIMIT :limitCount`,
    { limitCount },
  );
}

/** @returns whether the recording was still waiting and is now held under the token. */
export async function takeQueued(
  queued: QueuedRecording,
  { fenceToken, leaseSeconds }: { fenceToken: Buffer; leaseSeconds: number },
  transaction: Transaction,
): Promise<boolean> {
  const { recordingId, benchId, generation } = queued;
  const rowCount = await changedRowCount(
    `UPDATE recordings SET state = 'working', attempt = attempt + 1, fence_token = :fenceToken,
       lease_expires_at = NOW(3) + INTERVAL :leaseSeconds SECOND, updated_at = NOW(3)
     WHERE id = :recordingId AND bench_id = :benchId AND state = 'queued' AND generation = :generation`,
    { recordingId, benchId, generation, fenceToken, leaseSeconds },
    transaction,
  );
  if (rowCount === 0) return false;
  await changedRowCount(
    `INSERT INTO bench_turns (bench_id, served_at) VALUES (:benchId, NOW(3))
     ON DUPLICATE KEY UPDATE served_at = VALUES(served_at)`,
    { benchId },
    transaction,
  );
  return true;
}

/** @returns whether the claim was still held. */
async function changeClaimed(
  claim: RecordingClaim,
  assignments: string,
  { values = {}, transaction }: { values?: Values; transaction?: Transaction | undefined } = {},
): Promise<boolean> {
  const { recordingId, benchId, fenceToken } = claim;
  const rowCount = await changedRowCount(
    `UPDATE recordings SET ${assignments}, updated_at = NOW(3)
     WHERE id = :recordingId AND bench_id = :benchId AND state = 'working' AND fence_token = :fenceToken`,
    { ...values, recordingId, benchId, fenceToken },
    transaction,
  );
  return rowCount === 1;
}

/** Puts the end of the lease `leaseSeconds` from now. */
export function renewLease(claim: RecordingClaim, leaseSeconds: number): Promise<boolean> {
  return changeClaimed(claim, 'lease_expires_at = NOW(3) + INTERVAL :leaseSeconds SECOND', {
    values: { leaseSeconds },
  });
}

/** Ends a claim with a reading. */
export function finishClaim(claim: RecordingClaim, readingId: string, transaction: Transaction): Promise<boolean> {
  return changeClaimed(
    claim,
    `state = 'done', current_reading_id = :readingId, error_code = NULL, error_message = NULL, ${END_OF_CLAIM}`,
    { values: { readingId }, transaction },
  );
}

/** Ends a claim with a failure that trying again would not mend. */
export function failClaim(
  claim: RecordingClaim,
  failure: { readonly code: string; readonly message: string },
  transaction: Transaction,
): Promise<boolean> {
  const assignments = `state = 'failed', error_code = :code, error_message = :message, ${END_OF_CLAIM}`;
  return changeClaimed(claim, assignments, { values: { ...failure }, transaction });
}

/** Gives the recording back to the queue. A claim that `isForgiven` does not count as an attempt. */
export function releaseClaim(
  claim: RecordingClaim,
  { isForgiven }: { isForgiven: boolean },
  transaction: Transaction,
): Promise<boolean> {
  const attempt = isForgiven ? ', attempt = GREATEST(attempt, 1) - 1' : '';
  const assignments = `state = 'queued', generation = generation + 1, ${END_OF_CLAIM}${attempt}`;
  return changeClaimed(claim, assignments, { transaction });
}

/** @returns how often the decoder has now crashed on this file; null when the claim is no longer held. */
export async function countDecoderCrash(claim: RecordingClaim, transaction: Transaction): Promise<number | null> {
  const isHeld = await changeClaimed(claim, 'decoder_crash_count = decoder_crash_count + 1', { transaction });
  if (!isHeld) return null;
  const [row] = await select<{ crashCount: number }>(
    'SELECT decoder_crash_count AS crashCount FROM recordings WHERE id = :recordingId AND bench_id = :benchId',
    { recordingId: claim.recordingId, benchId: claim.benchId },
    transaction,
  );
  return row?.crashCount ?? null;
}

/** Claims whose worker gave no sign of life until the end of the lease; locked, so that no renewal slips between. */
export function listExpiredClaims(limitCount: number, transaction: Transaction): Promise<RecordingClaim[]> {
  return select(
    `/* every bench: a lost worker leaves claims of any bench */
     SELECT ${COLUMNS}, fence_token AS fenceToken FROM recordings
     WHERE state = 'working' AND lease_expires_at < NOW(3)
     ORDER BY lease_expires_at LIMIT :limitCount FOR UPDATE SKIP LOCKED`,
    { limitCount },
    transaction,
  );
}

/** Recordings that have waited so long that their bell may have been lost, oldest first. */
export function listUndelivered(waitedSeconds: number, limitCount: number): Promise<QueuedRecording[]> {
  return select(
    `/* every bench: a flushed Redis forgets the bells of all */
     SELECT ${COLUMNS} FROM recordings
     WHERE state = 'queued' AND queued_at < NOW(3) - INTERVAL :waitedSeconds SECOND
     ORDER BY queued_at LIMIT :limitCount`,
    { waitedSeconds, limitCount },
  );
}

/** Gives a waiting recording a fresh number for its bell. @returns false when it no longer waits under the old one. */
export async function renumberQueued({ recordingId, benchId, generation }: QueuedRecording): Promise<boolean> {
  const rowCount = await changedRowCount(
    `UPDATE recordings SET generation = generation + 1
     WHERE id = :recordingId AND bench_id = :benchId AND state = 'queued' AND generation = :generation`,
    { recordingId, benchId, generation },
  );
  return rowCount === 1;
}
