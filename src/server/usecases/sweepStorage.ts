import { inTransaction } from '../database/inTransaction.ts';
import { ServerError } from '../errors.ts';
import { logger } from '../logger.ts';
import { failMissingFile, listNamedBlobIds, listWithBlobs, type RecordingWithBlob } from '../models/recordingBlobs.ts';
import { blobStorage } from '../storage/blobStorage.ts';
import { announceRecording } from './announceRecording.ts';

/** An upload that is cut is forgotten after an hour; the slowest allowed one is done long before. */
const TEMPORARY_LIFE_SECONDS = 3600;
/** A file is durable before its row is: a day leaves room for any delay between the two. */
const UNNAMED_LIFE_SECONDS = 86_400;
const PAGE_COUNT = 500;

/** Ids are UUIDs in lower case: every one of them is greater. */
const BEFORE_ALL_IDS = '';

export interface SweepResult {
  readonly removedTemporaryCount: number;
  readonly quarantinedCount: number;
  readonly missingCount: number;
}

/**
 * Brings rows and files back together: forgotten temporary files go, files without a row are set aside, and a
 * recording whose file is gone says so and raises an alarm.
 */
export async function sweepStorage(): Promise<SweepResult> {
  const removedTemporaryCount = await blobStorage().sweepTemporary(TEMPORARY_LIFE_SECONDS);
  const { storedIds, quarantinedCount } = await quarantineUnnamed();
  const missingCount = await failMissing(storedIds);
  const result = { removedTemporaryCount, quarantinedCount, missingCount };
  logger().info(result, 'the storage was swept');
  return result;
}

async function quarantineUnnamed(): Promise<{ storedIds: ReadonlySet<string>; quarantinedCount: number }> {
  const storedIds = new Set<string>();
  let old: string[] = [];
  let quarantinedCount = 0;
  for await (const { blobId, ageSeconds } of blobStorage().list()) {
    storedIds.add(blobId);
    if (ageSeconds > UNNAMED_LIFE_SECONDS) old.push(blobId);
    if (old.length < PAGE_COUNT) continue;
    quarantinedCount += await quarantineThoseUnnamed(old);
    old = [];
  }
  quarantinedCount += await quarantineThoseUnnamed(old);
  return { storedIds, quarantinedCount };
}

async function quarantineThoseUnnamed(blobIds: readonly string[]): Promise<number> {
  const named = await listNamedBlobIds(blobIds);
  const unnamed = blobIds.filter((blobId) => !named.has(blobId));
  for (const blobId of unnamed) {
    await blobStorage().quarantine(blobId);
    logger().warn({ blobId }, 'a file that no recording names was set aside');
  }
  return unnamed.length;
}

async function failMissing(storedIds: ReadonlySet<string>): Promise<number> {
  let missingCount = 0;
  let afterId = BEFORE_ALL_IDS;
  for (;;) {
    const page = await listWithBlobs(afterId, PAGE_COUNT);
    for (const recording of page.filter(({ blobId }) => !storedIds.has(blobId))) {
      if (await failIfMissing(recording, storedIds)) missingCount += 1;
    }
    const last = page.at(-1);
    if (last === undefined) return missingCount;
    afterId = last.recordingId;
  }
}

async function failIfMissing(recording: RecordingWithBlob, storedIds: ReadonlySet<string>): Promise<boolean> {
  if (!(await isMissing(recording.blobId))) return false;
  refuseEmptyStorage(storedIds);
  return failOne(recording);
}

/** Files come while the sweeper works, so the list alone proves nothing. */
async function isMissing(blobId: string): Promise<boolean> {
  try {
    await blobStorage().byteCount(blobId);
    return false;
  } catch (error) {
    if (error instanceof ServerError && error.code === 'file-missing') return true;
    throw error;
  }
}

/** A volume that is not mounted looks like a storage without files: no reason to fail every recording. */
function refuseEmptyStorage(storedIds: ReadonlySet<string>): void {
  if (storedIds.size === 0) throw new Error('ALARM: the storage holds no file at all; is its volume mounted?');
}

function failOne(recording: RecordingWithBlob): Promise<boolean> {
  const message = 'The file of this recording is missing from storage. Tell whoever runs this server.';
  return inTransaction(async (transaction) => {
    if (!(await failMissingFile(recording, message, transaction))) return false;
    await announceRecording({ ...recording, generation: recording.generation + 1 }, 'failed', transaction);
    logger().error(
      { recordingId: recording.recordingId, blobId: recording.blobId },
      'ALARM: a recording without its file',
    );
    return true;
  });
}
