import { inTransaction } from '../database/inTransaction.ts';
import { type RecordingClaim, releaseClaim } from '../models/recordingClaims.ts';
import { ringWorkers } from '../queue/ringWorkers.ts';
import { announceRecording } from './announceRecording.ts';

/**
 * Puts a claimed recording back into the queue at once, for instance when this worker stops.
 *
 * @returns false when the claim was lost already
 */
export async function releaseRecording({ claim }: { claim: RecordingClaim }): Promise<boolean> {
  const { recordingId } = claim;
  const generation = claim.generation + 1;
  const isReleased = await inTransaction(async (transaction) => {
    if (!(await releaseClaim(claim, { isForgiven: true }, transaction))) return false;
    await announceRecording({ ...claim, generation }, 'queued', transaction);
    return true;
  });
  if (isReleased) await ringWorkers({ recordingId, generation });
  return isReleased;
}
