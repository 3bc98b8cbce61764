import { logger } from '#server/logger.ts';
import type { RecordingClaim } from '#server/models/recordingClaims.ts';
import { claimRecording } from '#server/usecases/claimRecording.ts';
import { releaseRecording } from '#server/usecases/releaseRecording.ts';
import type { Bell } from './Bell.ts';
import { keepClaim } from './keepClaim.ts';
import { analyseRecording } from './processors/analyseRecording.ts';
import { AnalysisThread } from './threads/AnalysisThread.ts';

/** How often an idle slot looks into the database when no bell rings. */
const POLL_SECONDS = 2;

interface Slot {
  readonly bell: Bell;
  readonly threadEntry: URL;
  readonly leaseSeconds: number;
  /** No further claims. */
  readonly stopping: AbortSignal;
  /** No further work: the claim in hand goes back into the queue. */
  readonly giveUp: AbortSignal;
}

/** One slot of the worker: claims and analyses one recording after the other, in a thread of its own. */
export async function claimLoop({ bell, threadEntry, leaseSeconds, stopping, giveUp }: Slot): Promise<void> {
  const thread = new AnalysisThread(threadEntry);
  // A worker whose threads cannot start must not use up the attempts of what waits.
  await thread.ready();
  let lastFailure = '';
  while (!stopping.aborted) {
    const heardCount = bell.ringCount;
    try {
      const claim = await claimRecording({ leaseSeconds });
      if (claim) await workOn(claim, { thread, leaseSeconds, giveUp });
      else await bell.sleep(heardCount, POLL_SECONDS);
      lastFailure = '';
    } catch (error) {
      // One log line an outage, not one a try.
      if (String(error) !== lastFailure) logger().error({ err: error }, 'a slot of the worker failed');
      lastFailure = String(error);
      await bell.sleep(bell.ringCount, POLL_SECONDS);
    }
  }
  await thread.close();
}

interface Work {
  readonly thread: AnalysisThread;
  readonly leaseSeconds: number;
  readonly giveUp: AbortSignal;
}

async function workOn(claim: RecordingClaim, { thread, leaseSeconds, giveUp }: Work): Promise<void> {
  const lost = new AbortController();
  const onLost = (): void => {
    lost.abort();
  };
  const letGo = keepClaim({ claim, leaseSeconds, onLost });
  try {
    await analyseRecording({ claim, thread, signal: AbortSignal.any([lost.signal, giveUp]) });
  } catch (error) {
    // Otherwise the lease runs out, so the next attempt comes after a pause and is counted.
    const isInterrupted = giveUp.aborted || lost.signal.aborted;
    if (!isInterrupted) throw new Error(`recording ${claim.recordingId} could not be analysed`, { cause: error });
    if (giveUp.aborted) await releaseRecording({ claim });
    else logger().warn({ recordingId: claim.recordingId }, 'the claim on a recording was lost');
  } finally {
    letGo();
  }
}
