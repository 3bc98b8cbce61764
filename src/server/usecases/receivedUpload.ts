import type { TemporaryBlob } from '../storage/storage.ts';

/** A file that has come in whole and lies in temporary storage; whoever takes it commits or discards it. */
export interface ReceivedUpload {
  readonly temporary: TemporaryBlob;
  /** As it is shown; see shownFileName. */
  readonly fileName: string;
  readonly byteCount: number;
  /** SHA-256 of the bytes, 32 bytes. */
  readonly sha256: Buffer;
}
