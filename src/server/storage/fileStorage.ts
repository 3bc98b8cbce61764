import { randomUUID } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { chmod, mkdir, open, readdir, rename, rm, stat, statfs } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { blobError, storageError, systemCode } from './storageError.ts';
import type { BlobStorage, DerivativeKind, FreeSpace, ReadableBlob, StoredBlob, TemporaryBlob } from './storage.ts';
import { createTemporaryFile, syncFolder } from './temporaryFile.ts';

const FAN_OUT_CHARACTERS = 2;
const READ_ONLY = 0o440;
/** Blocks that a reader holds in memory: large enough for a fast disk, small enough for many slow readers. */
const READ_CHUNK_BYTES = 256 * 1024;
const BLOB_ID = /^[0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;

/**
 * Blobs as files in a folder of this machine. The order fsync(file), rename, fsync(folder) makes a committed blob
 * survive a power cut; the rename makes it appear whole or not at all.
 *
 *     tmp/<uuid>   blobs/<xx>/<blob id>   derivatives/<xx>/<blob id>.<kind>   quarantine/<blob id>
 */
export class FileStorage implements BlobStorage {
  readonly #folder: string;
  readonly #builds = new Map<string, Promise<void>>();

  constructor(folder: string) {
    this.#folder = folder;
  }

  async createTemporary(): Promise<TemporaryBlob> {
    return createTemporaryFile(await this.#ensureFolder('tmp'));
  }

  async commit(temporary: TemporaryBlob): Promise<string> {
    const blobId = randomUUID();
    try {
      const folder = await this.#ensureFolder('blobs', fanOut(blobId));
      await chmod(temporary.pathForReading, READ_ONLY);
      await rename(temporary.pathForReading, join(folder, blobId));
      await syncFolder(folder);
      return blobId;
    } catch (error) {
      throw storageError(error);
    }
  }

  async byteCount(blobId: string): Promise<number> {
    try {
      return (await stat(this.#blobPath(blobId))).size;
    } catch (error) {
      throw blobError(error);
    }
  }

  async open(blobId: string): Promise<ReadableBlob> {
    return readable(this.#blobPath(blobId), await this.byteCount(blobId));
  }

  async pathForReading(blobId: string): Promise<string> {
    await this.byteCount(blobId);
    return this.#blobPath(blobId);
  }

  async remove(blobId: string): Promise<void> {
    try {
      await rm(this.#blobPath(blobId), { force: true });
      await rm(this.#derivativePath(blobId, 'playback'), { force: true });
    } catch (error) {
      throw storageError(error);
    }
  }

  async derivative(
    blobId: string,
    kind: DerivativeKind,
    build: (outputPath: string) => Promise<unknown>,
  ): Promise<ReadableBlob> {
    const path = this.#derivativePath(blobId, kind);
    let making = this.#builds.get(path);
    if (making === undefined) {
      making = this.#findOrBuild(path, build).finally(() => this.#builds.delete(path));
      this.#builds.set(path, making);
    }
    await making;
    return readable(path, (await stat(path)).size);
  }

  async #findOrBuild(path: string, build: (outputPath: string) => Promise<unknown>): Promise<void> {
    if ((await changedSeconds(path)) !== null) return;
    const temporaryPath = join(await this.#ensureFolder('tmp'), randomUUID());
    try {
      await build(temporaryPath);
      await mkdir(dirname(path), { recursive: true });
      await rename(temporaryPath, path);
    } finally {
      await rm(temporaryPath, { force: true });
    }
  }

  async freeSpace(): Promise<FreeSpace> {
    try {
      const { bavail, blocks, bsize } = await statfs(await this.#ensureFolder('blobs'));
      return { freeBytes: bavail * bsize, totalBytes: blocks * bsize };
    } catch (error) {
      throw storageError(error);
    }
  }

  async *list(): AsyncGenerator<StoredBlob> {
    const blobs = await this.#ensureFolder('blobs');
    const now = await this.#nowSeconds();
    for (const fan of await readdir(blobs)) {
      for (const blobId of await readdir(join(blobs, fan))) {
        const changed = await changedSeconds(join(blobs, fan, blobId));
        if (changed !== null && BLOB_ID.test(blobId)) yield { blobId, ageSeconds: now - changed };
      }
    }
  }

  async quarantine(blobId: string): Promise<void> {
    try {
      await rename(this.#blobPath(blobId), join(await this.#ensureFolder('quarantine'), blobId));
    } catch (error) {
      throw blobError(error);
    }
  }

  async sweepTemporary(olderThanSeconds: number): Promise<number> {
    const folder = await this.#ensureFolder('tmp');
    const now = await this.#nowSeconds();
    let removedCount = 0;
    for (const name of await readdir(folder)) {
      const changed = await changedSeconds(join(folder, name));
      if (changed === null || now - changed < olderThanSeconds) continue;
      await rm(join(folder, name), { force: true });
      removedCount += 1;
    }
    return removedCount;
  }

  /** The time that the file system would stamp on a file now, so that ages never mix two clocks. */
  async #nowSeconds(): Promise<number> {
    const marker = join(this.#folder, '.clock');
    await (await open(marker, 'w')).close();
    return (await stat(marker)).mtimeMs / 1000;
  }

  async #ensureFolder(...names: string[]): Promise<string> {
    const folder = join(this.#folder, ...names);
    try {
      const firstMade = await mkdir(folder, { recursive: true });
      // A folder that is itself lost in a power cut would take its files with it.
      if (firstMade !== undefined) await syncFolder(dirname(firstMade));
      if (firstMade !== undefined && firstMade !== folder) await syncFolder(dirname(folder));
      return folder;
    } catch (error) {
      throw storageError(error);
    }
  }

  #blobPath(blobId: string): string {
    return join(this.#folder, 'blobs', fanOut(blobId), blobId);
  }

  #derivativePath(blobId: string, kind: DerivativeKind): string {
    return join(this.#folder, 'derivatives', fanOut(blobId), `${blobId}.${kind}`);
  }
}

function fanOut(blobId: string): string {
  if (!BLOB_ID.test(blobId)) throw new Error(`fileStorage: blobId must be a UUID in lower case, got ${blobId}`);
  return blobId.slice(0, FAN_OUT_CHARACTERS);
}

function readable(path: string, byteCount: number): ReadableBlob {
  return {
    byteCount,
    read: (range) => {
      const stretch = range && { start: range.firstByte, end: range.lastByte };
      return createReadStream(path, { highWaterMark: READ_CHUNK_BYTES, ...stretch });
    },
  };
}

/** @returns null when the file is gone, because another process swept it first */
async function changedSeconds(path: string): Promise<number | null> {
  try {
    return (await stat(path)).mtimeMs / 1000;
  } catch (error) {
    if (systemCode(error) === 'ENOENT') return null;
    throw storageError(error);
  }
}
