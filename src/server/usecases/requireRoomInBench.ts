import { byteText } from '#lib/format/byteText.ts';
import { ServerError } from '../errors.ts';
import { Recording } from '../models/Recording.ts';
import { storageFull } from '../storage/storageError.ts';

/** Recordings of one bench that may wait for analysis at once. */
export const WAITING_MAXIMUM_COUNT = 1000;
/** Bytes of originals that one bench may keep (5 GB). */
export const BENCH_MAXIMUM_BYTES = 5_000_000_000;
const WAITING_RETRY_SECONDS = 60;

/**
 * One bench may not fill the queue or the disk of all.
 *
 * @throws ServerError too-many-waiting, storage-full, with the numbers
 */
export async function requireRoomInBench(benchId: string, incomingBytes: number): Promise<void> {
  const waitingCount = await Recording.count({ where: { benchId, state: 'queued' } });
  if (waitingCount >= WAITING_MAXIMUM_COUNT) {
    throw new ServerError({
      code: 'too-many-waiting',
      detail:
        `${String(waitingCount)} recordings of this bench wait for analysis; at most ${String(WAITING_MAXIMUM_COUNT)} may. ` +
        'Upload again when some are done.',
      retryAfterSeconds: WAITING_RETRY_SECONDS,
    });
  }
  const keptBytes = await Recording.sumBytes(benchId);
  if (keptBytes + incomingBytes <= BENCH_MAXIMUM_BYTES) return;
  throw storageFull(
    `This bench keeps ${byteText(keptBytes)} of at most ${byteText(BENCH_MAXIMUM_BYTES)}. ` +
      'Nothing was stored; delete recordings that are not needed, or use another bench.',
  );
}
