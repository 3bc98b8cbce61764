import { inTransaction } from '../database/inTransaction.ts';
import { CANNOT_DECODE_MESSAGE } from '../media/mediaErrors.ts';
import { countDecoderCrash, failClaim, type RecordingClaim, releaseClaim } from '../models/recordingClaims.ts';
import { ringWorkers } from '../queue/ringWorkers.ts';
import { announceRecording } from './announceRecording.ts';

/** A file on which the decoder or the analysis died this often is not tried again. */
const POISON_CRASH_COUNT = 2;

/**
 * Counts a crash against the file. The first may be the machine's fault, so the recording goes back into the queue;
 * the second makes it `cannot-decode`.
 *
 * @returns what became of the recording; `lost` when the claim was no longer held
 */
export async function noteDecoderCrash({ claim }: { claim: RecordingClaim }): Promise<'queued' | 'failed' | 'lost'> {
  const generation = claim.generation + 1;
  const outcome = await inTransaction(async (transaction) => {
    const crashCount = await countDecoderCrash(claim, transaction);
    if (crashCount === null) return 'lost';
    if (crashCount >= POISON_CRASH_COUNT) {
      await failClaim(claim, { code: 'cannot-decode', message: CANNOT_DECODE_MESSAGE }, transaction);
      await announceRecording(claim, 'failed', transaction);
      return 'failed';
    }
    await releaseClaim(claim, { isForgiven: false }, transaction);
    await announceRecording({ ...claim, generation }, 'queued', transaction);
    return 'queued';
  });
  if (outcome === 'queued') await ringWorkers({ recordingId: claim.recordingId, generation });
  return outcome;
}
