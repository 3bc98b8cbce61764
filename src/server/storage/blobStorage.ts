import { join } from 'node:path';
import { settings } from '../env.ts';
import { FileStorage } from './fileStorage.ts';
import type { BlobStorage } from './storage.ts';

let current: BlobStorage | undefined;

/** The storage of this process. */
export function blobStorage(): BlobStorage {
  current ??= new FileStorage(join(settings().dataFolder, 'storage'));
  return current;
}
