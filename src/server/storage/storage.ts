import type { Readable } from 'node:stream';

/**
 * Where the bytes of recordings live. Rows hold only a blob id; nothing outside this folder knows a path, so that
 * another kind of storage can take the place of the file system.
 */

/** Bytes on their way in: invisible to readers until they are committed, swept when they are forgotten. */
export interface TemporaryBlob {
  /** Appends. Resolves when the bytes were handed to the operating system, which is the back-pressure of an upload. */
  write(chunk: Uint8Array): Promise<void>;
  /** Makes the bytes durable and closes them to further writing. */
  finish(): Promise<void>;
  /** Forgets the bytes; may be called at any time and more than once, and never throws. */
  discard(): Promise<void>;
  /** Where a decoder may read the finished bytes before they are committed. */
  readonly pathForReading: string;
}

/** A stretch of bytes, both ends included, as in an HTTP Range header. */
export interface ByteRange {
  readonly firstByte: number;
  readonly lastByte: number;
}

/** Bytes that can be read, whole or in part, as often as wanted. */
export interface ReadableBlob {
  readonly byteCount: number;
  read(range?: ByteRange): Readable;
}

export interface StoredBlob {
  readonly blobId: string;
  /** Age by the clock of the storage itself, so that a changed clock of this process sweeps nothing early. */
  readonly ageSeconds: number;
}

export interface FreeSpace {
  readonly freeBytes: number;
  readonly totalBytes: number;
}

/** What can be made from an original; rebuilt whenever it is missing. */
export type DerivativeKind = 'playback';

/**
 * Every method throws ServerError: `storage-full`, `storage-unavailable`, or `file-missing` for a blob that a row
 * names and storage does not have.
 */
export interface BlobStorage {
  createTemporary(): Promise<TemporaryBlob>;
  /**
   * Turns a finished temporary blob into an immutable one that survives a power cut.
   * @returns the blob id, a random UUID
   */
  commit(temporary: TemporaryBlob): Promise<string>;
  byteCount(blobId: string): Promise<number>;
  open(blobId: string): Promise<ReadableBlob>;
  /** For a decoder that must seek; read only. */
  pathForReading(blobId: string): Promise<string>;
  /** Removes a blob and everything made from it; nothing happens when it is gone already. */
  remove(blobId: string): Promise<void>;
  /**
   * What was made from a blob, made now by `build` when it is missing. Calls for the same one at the same time share
   * the making. Errors of `build` are thrown on.
   */
  derivative(
    blobId: string,
    kind: DerivativeKind,
    build: (outputPath: string) => Promise<unknown>,
  ): Promise<ReadableBlob>;
  freeSpace(): Promise<FreeSpace>;
  /** All blobs, for the sweeper. */
  list(): AsyncIterable<StoredBlob>;
  /** Sets a blob that no row names aside, out of reach of every reader, for a person to look at. */
  quarantine(blobId: string): Promise<void>;
  /** @returns how many forgotten temporary blobs were removed */
  sweepTemporary(olderThanSeconds: number): Promise<number>;
}
