import type { FileHandle } from 'node:fs/promises';
import { readAt } from './readAt.ts';

const BOX_HEADER_BYTES = 16;
const MAXIMUM_BOXES = 1000;
/** Size fields with a meaning of their own: 64-bit size follows, box goes on to the end of the file (ISO/IEC 14496-12, 4.2). */
const SIZE_FOLLOWS = 1;
const SIZE_TO_END = 0;

/**
 * Whether an MP4, 3GP or QuickTime file lacks its index (`moov`), because recorders write it last: the
 * phone died, the app was stopped, or the copy was cut. Its sound is there but cannot be found.
 *
 * @param fileBytes size of the file, bytes
 * @returns false when the index is whole, and for a file that holds no media box either
 */
export async function isUnfinishedMp4(file: FileHandle, fileBytes: number): Promise<boolean> {
  let offset = 0;
  let hasMedia = false;
  for (let box = 0; box < MAXIMUM_BOXES && offset < fileBytes; box++) {
    const header = await readAt(file, BOX_HEADER_BYTES, offset);
    const type = header.toString('latin1', 4, 8);
    const sizeBytes = boxSize(header, fileBytes - offset);
    if (type === 'moov') return offset + sizeBytes > fileBytes;
    if (type === 'mdat') hasMedia = true;
    if (sizeBytes < 8) break;
    offset += sizeBytes;
  }
  return hasMedia;
}

function boxSize(header: Buffer, bytesToEnd: number): number {
  if (header.length < 8) return 0;
  const size = header.readUInt32BE(0);
  if (size === SIZE_TO_END) return bytesToEnd;
  if (size !== SIZE_FOLLOWS) return size;
  return header.length < BOX_HEADER_BYTES ? 0 : Number(header.readBigUInt64BE(8));
}
