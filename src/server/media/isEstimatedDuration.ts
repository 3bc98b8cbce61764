import type { FileHandle } from 'node:fs/promises';
import { readAt } from './readAt.ts';
import { id3BodyBytes, type MediaContainer } from './sniffContainer.ts';

/** Where an encoder leaves the number of frames: in the first frame, behind its side information. */
const FRAME_COUNT_TAGS = ['Xing', 'Info', 'VBRI'];
const FIRST_FRAME_BYTES = 64;
const ID3_HEADER_BYTES = 10;

/**
 * Whether the duration of a file can only be guessed from its bit rate: raw AAC and AMR, and MP3 without a
 * frame count. A guess says nothing about missing sound.
 */
export async function isEstimatedDuration(file: FileHandle, container: MediaContainer): Promise<boolean> {
  if (container !== 'mp3') return container === 'aac' || container === 'amr';
  const head = await readAt(file, ID3_HEADER_BYTES, 0);
  const isTagged = head.toString('latin1', 0, 3) === 'ID3';
  const firstFrame = await readAt(file, FIRST_FRAME_BYTES, isTagged ? ID3_HEADER_BYTES + id3BodyBytes(head) : 0);
  return !FRAME_COUNT_TAGS.some((tag) => firstFrame.includes(tag, 0, 'latin1'));
}
