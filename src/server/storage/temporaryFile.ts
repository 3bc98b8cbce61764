import { randomUUID } from 'node:crypto';
import { type FileHandle, open, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { storageError } from './storageError.ts';
import type { TemporaryBlob } from './storage.ts';

const OWNER_ONLY = 0o600;

/** @param folder where it is made; on the same file system as the blobs, so that a rename moves it */
export async function createTemporaryFile(folder: string): Promise<TemporaryBlob> {
  const path = join(folder, randomUUID());
  try {
    return new TemporaryFile(path, await open(path, 'wx', OWNER_ONLY));
  } catch (error) {
    throw storageError(error);
  }
}

class TemporaryFile implements TemporaryBlob {
  readonly pathForReading: string;
  #handle: FileHandle | null;

  constructor(path: string, handle: FileHandle) {
    this.pathForReading = path;
    this.#handle = handle;
  }

  async write(chunk: Uint8Array): Promise<void> {
    if (this.#handle === null) throw new Error('TemporaryFile.write: the file is closed');
    try {
      let offset = 0;
      // write(2) may take less than it was given, most of all on a disk that is nearly full.
      while (offset < chunk.length) offset += (await this.#handle.write(chunk, offset)).bytesWritten;
    } catch (error) {
      throw storageError(error);
    }
  }

  async finish(): Promise<void> {
    try {
      await this.#handle?.sync();
      await this.#close();
    } catch (error) {
      throw storageError(error);
    }
  }

  async discard(): Promise<void> {
    // What cannot be removed now is swept later.
    await this.#close().catch(() => undefined);
    await rm(this.pathForReading, { force: true }).catch(() => undefined);
  }

  async #close(): Promise<void> {
    const handle = this.#handle;
    this.#handle = null;
    await handle?.close();
  }
}

/** fsync of a folder: makes the names in it durable. */
export async function syncFolder(path: string): Promise<void> {
  const handle = await open(path, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}
