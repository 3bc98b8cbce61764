import { randomBytes } from 'node:crypto';
import { inTransaction } from '../database/inTransaction.ts';
import { listNextQueued, type QueuedRecording, type RecordingClaim, takeQueued } from '../models/recordingClaims.ts';
import { announceRecording } from './announceRecording.ts';

const FENCE_TOKEN_BYTES = 16;
/** More than one, because another worker may take the first in the same moment. */
const CONSIDERED_COUNT = 8;

/**
 * Takes the recording whose turn it is.
 *
 * @param leaseSeconds how long the claim holds unless it is renewed
 * @returns null when nothing waits
 */
export async function claimRecording({ leaseSeconds }: { leaseSeconds: number }): Promise<RecordingClaim | null> {
  for (const queued of await listNextQueued(CONSIDERED_COUNT)) {
    const claim = await claimQueued(queued, leaseSeconds);
    if (claim !== null) return claim;
  }
  return null;
}

function claimQueued(queued: QueuedRecording, leaseSeconds: number): Promise<RecordingClaim | null> {
  const claim = {
    ...queued,
    attempt: queued.attempt + 1,
    fenceToken: randomBytes(FENCE_TOKEN_BYTES),
  };
  return inTransaction(async (transaction) => {
    if (!(await takeQueued(queued, { fenceToken: claim.fenceToken, leaseSeconds }, transaction))) return null;
    await announceRecording(claim, 'working', transaction);
    return claim;
  });
}
