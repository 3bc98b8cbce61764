import { inTransaction } from '../database/inTransaction.ts';
import { ERROR_CATALOGUE } from '../errors.ts';
import { logger } from '../logger.ts';
import { failClaim, listExpiredClaims, type RecordingClaim, releaseClaim } from '../models/recordingClaims.ts';
import { ringWorkers } from '../queue/ringWorkers.ts';
import { announceRecording } from './announceRecording.ts';

/** Claims of one recording that may end without a result before it is given up. */
const ATTEMPT_MAXIMUM_COUNT = 5;
const BATCH_COUNT = 100;

const WORKER_LOST = {
  code: 'worker-lost',
  message: `${ERROR_CATALOGUE['worker-lost'].title}: ${String(ATTEMPT_MAXIMUM_COUNT)} attempts ended without a result. The file is kept; analyse it again, and tell whoever runs this server if it happens again.`,
} as const;

/**
 * Takes recordings back from workers that gave no sign of life until their lease ran out.
 *
 * @returns how many went back into the queue and how many were given up
 */
export async function requeueExpired(): Promise<{
  requeuedCount: number;
  lostCount: number;
}> {
  const { requeued, lost } = await inTransaction(async (transaction) => {
    const expired = await listExpiredClaims(BATCH_COUNT, transaction);
    const requeued = expired.filter(({ attempt }) => attempt < ATTEMPT_MAXIMUM_COUNT).map(withNextGeneration);
    const lost = expired.filter(({ attempt }) => attempt >= ATTEMPT_MAXIMUM_COUNT);
    for (const claim of requeued) {
      await releaseClaim(claim, { isForgiven: false }, transaction);
      await announceRecording(claim, 'queued', transaction);
    }
    for (const claim of lost) {
      await failClaim(claim, WORKER_LOST, transaction);
      await announceRecording(claim, 'failed', transaction);
    }
    return { requeued, lost };
  });
  for (const { recordingId, attempt } of lost)
    logger().error({ recordingId, attempt }, 'recording given up: worker-lost');
  for (const { recordingId, generation } of requeued) await ringWorkers({ recordingId, generation });
  return { requeuedCount: requeued.length, lostCount: lost.length };
}

function withNextGeneration(claim: RecordingClaim): RecordingClaim {
  return { ...claim, generation: claim.generation + 1 };
}
