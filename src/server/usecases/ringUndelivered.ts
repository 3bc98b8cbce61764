import { listUndelivered, renumberQueued } from '../models/recordingClaims.ts';
import { ringWorkers } from '../queue/ringWorkers.ts';

/** By then an idle worker would have come by; only a lost bell or a long queue leaves a recording waiting. */
const UNDELIVERED_AFTER_SECONDS = 15;
/** A bell wakes a worker, which then takes whatever waits: a few of them are as good as thousands. */
const RING_COUNT = 10;

/**
 * Rings again for recordings whose bell may have been lost, for instance when Redis was flushed. A fresh number
 * makes a fresh job id, because BullMQ ignores an id that it still knows.
 *
 * @returns how many bells were rung
 */
export async function ringUndelivered(): Promise<number> {
  let rungCount = 0;
  for (const queued of await listUndelivered(UNDELIVERED_AFTER_SECONDS, RING_COUNT)) {
    if (!(await renumberQueued(queued))) continue;
    await ringWorkers({
      recordingId: queued.recordingId,
      generation: queued.generation + 1,
    });
    rungCount += 1;
  }
  return rungCount;
}
