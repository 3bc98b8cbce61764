import { createHash } from 'node:crypto';
import type { TemporaryBlob } from './storage.ts';

export interface WrittenBytes {
  readonly byteCount: number;
  /** SHA-256 of all bytes, 32 bytes. */
  readonly sha256: Buffer;
}

interface WriteHashedOptions {
  readonly source: AsyncIterable<Uint8Array>;
  readonly target: TemporaryBlob;
  readonly maximumBytes: number;
  /** Made when the source turns out longer than `maximumBytes`; nothing above the limit is written. */
  readonly tooLarge: () => Error;
}

/**
 * Writes a stream to storage and hashes it on the way, one block in memory at a time. On return the bytes are
 * durable; after a throw the caller discards the target.
 */
export async function writeHashed({
  source,
  target,
  maximumBytes,
  tooLarge,
}: WriteHashedOptions): Promise<WrittenBytes> {
  const hash = createHash('sha256');
  let byteCount = 0;
  for await (const chunk of source) {
    byteCount += chunk.length;
    if (byteCount > maximumBytes) throw tooLarge();
    hash.update(chunk);
    await target.write(chunk);
  }
  await target.finish();
  return { byteCount, sha256: hash.digest() };
}
