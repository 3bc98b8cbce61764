import type { FileHandle } from 'node:fs/promises';

/**
 * Reads up to `byteCount` bytes from an absolute offset; fewer only where the file ends.
 *
 * @param byteCount bytes, ≥ 0
 * @param offset bytes from the start of the file, ≥ 0
 * @returns a buffer of its own, shape [bytes read]
 */
export async function readAt(file: FileHandle, byteCount: number, offset: number): Promise<Buffer<ArrayBuffer>> {
  const bytes = Buffer.alloc(byteCount);
  let filled = 0;
  while (filled < byteCount) {
    const { bytesRead } = await file.read(bytes, filled, byteCount - filled, offset + filled);
    if (bytesRead === 0) break;
    filled += bytesRead;
  }
  return bytes.subarray(0, filled);
}
