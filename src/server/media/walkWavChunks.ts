import type { FileHandle } from 'node:fs/promises';
import { readAt } from './readAt.ts';

/** One chunk of a RIFF file: where its body is and how long the header says it is. */
export interface WavChunk {
  readonly id: string;
  readonly bodyOffsetBytes: number;
  readonly declaredBytes: number;
}

/** A stretch of a file read as chunks. */
export interface ChunkWalk {
  readonly chunks: readonly WavChunk[];
  /** Whether the chunks fill the stretch to its end: no garbage, nothing cut off. */
  readonly isComplete: boolean;
}

interface WalkOptions {
  readonly fileBytes: number;
  readonly fromOffsetBytes: number;
  readonly isLittleEndian: boolean;
  /** Id of the chunk after which to stop; without it the walk goes to the end of the file. */
  readonly stopAtId?: string;
}

const CHUNK_HEADER_BYTES = 8;
/** A real file has a handful; a hostile one could make us read millions of empty ones. */
const MAXIMUM_CHUNKS = 1000;
/** Four printable characters. */
const PLAUSIBLE_ID = /^[\x20-\x7e]{4}$/;

/**
 * Reads the chunk headers of a RIFF file, skipping the bodies. The padding byte after an odd body is
 * optional, as some recorders leave it out.
 */
export async function walkWavChunks(file: FileHandle, options: WalkOptions): Promise<ChunkWalk> {
  const { fileBytes, isLittleEndian, stopAtId } = options;
  const chunks: WavChunk[] = [];
  let offset = options.fromOffsetBytes;
  while (offset + CHUNK_HEADER_BYTES <= fileBytes && chunks.length < MAXIMUM_CHUNKS) {
    const header = await readAt(file, CHUNK_HEADER_BYTES, offset);
    const id = header.toString('latin1', 0, 4);
    if (!PLAUSIBLE_ID.test(id)) return { chunks, isComplete: false };
    const declaredBytes = isLittleEndian ? header.readUInt32LE(4) : header.readUInt32BE(4);
    chunks.push({ id, bodyOffsetBytes: offset + CHUNK_HEADER_BYTES, declaredBytes });
    if (id === stopAtId) return { chunks, isComplete: true };
    offset = await nextChunkOffset(file, offset + CHUNK_HEADER_BYTES + declaredBytes, declaredBytes % 2 === 1);
  }
  const leftBytes = fileBytes - offset;
  return { chunks, isComplete: leftBytes >= -1 && leftBytes <= 1 };
}

/** After an odd body the next chunk starts one byte later, unless only the unpadded place holds an id. */
async function nextChunkOffset(file: FileHandle, bodyEndBytes: number, isOdd: boolean): Promise<number> {
  if (!isOdd) return bodyEndBytes;
  const bytes = await readAt(file, 5, bodyEndBytes);
  const isPadded =
    PLAUSIBLE_ID.test(bytes.toString('latin1', 1, 5)) || !PLAUSIBLE_ID.test(bytes.toString('latin1', 0, 4));
  return isPadded ? bodyEndBytes + 1 : bodyEndBytes;
}
