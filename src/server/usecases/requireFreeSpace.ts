import { byteText } from '#lib/format/byteText.ts';
import { settings } from '../env.ts';
import { storageFull } from '../storage/storageError.ts';
import type { BlobStorage } from '../storage/storage.ts';

const MINIMUM_FREE_FRACTION = 0.05;

/**
 * Refuses uploads while there is still room for the database, which a full disk would kill.
 *
 * @param incomingBytes what is about to be stored, as far as it is known
 * @throws ServerError storage-full
 */
export async function requireFreeSpace(storage: BlobStorage, incomingBytes: number): Promise<void> {
  const { freeBytes, totalBytes } = await storage.freeSpace();
  const minimumBytes = Math.max(settings().minimumFreeBytes, totalBytes * MINIMUM_FREE_FRACTION);
  if (freeBytes - incomingBytes >= minimumBytes) return;
  throw storageFull(
    `${byteText(freeBytes)} are free on the disk for recordings and ${byteText(Math.round(minimumBytes))} must stay free. ` +
      'Nothing was stored. Tell whoever runs this server.',
  );
}
