import { storageError } from '#server/storage/storageError.ts';
import type { BlobStorage, TemporaryBlob } from '#server/storage/storage.ts';

/** The steps of the path of an upload through storage, in their order. */
export const STORAGE_STEPS = ['freeSpace', 'createTemporary', 'write', 'finish', 'commit'] as const;
export type StorageStep = (typeof STORAGE_STEPS)[number];

/**
 * A real storage of which one step fails as the file system would: before it does anything, or after it did all.
 */
export function faultyStorage(
  real: BlobStorage,
  fault: { readonly step: StorageStep; readonly code: string; readonly when?: 'before' | 'after' },
): BlobStorage {
  const run = async <Result>(step: StorageStep, work: () => Promise<Result>): Promise<Result> => {
    if (step !== fault.step) return work();
    if (fault.when === 'after') await work();
    throw storageError(Object.assign(new Error(`${fault.code}: injected`), { code: fault.code }));
  };
  const faultyTemporary = (temporary: TemporaryBlob): TemporaryBlob => ({
    pathForReading: temporary.pathForReading,
    write: (chunk) => run('write', () => temporary.write(chunk)),
    finish: () => run('finish', () => temporary.finish()),
    discard: () => temporary.discard(),
  });
  return {
    createTemporary: () => run('createTemporary', async () => faultyTemporary(await real.createTemporary())),
    commit: (temporary) => run('commit', () => real.commit(temporary)),
    freeSpace: () => run('freeSpace', () => real.freeSpace()),
    byteCount: (blobId) => real.byteCount(blobId),
    open: (blobId) => real.open(blobId),
    pathForReading: (blobId) => real.pathForReading(blobId),
    remove: (blobId) => real.remove(blobId),
    derivative: (blobId, kind, build) => real.derivative(blobId, kind, build),
    list: () => real.list(),
    quarantine: (blobId) => real.quarantine(blobId),
    sweepTemporary: (olderThanSeconds) => real.sweepTemporary(olderThanSeconds),
  };
}
