/**
 * Our own reader of WAV headers. Recorders that crash, stream or save badly write sizes that no decoder
 * can trust, and decoders trust them silently; so the header is judged here and the bytes are counted.
 */
import type { FileHandle } from 'node:fs/promises';
import { MediaRefused } from './mediaErrors.ts';
import { parseWavFormat, type WavFormat } from './parseWavFormat.ts';
import { readAt } from './readAt.ts';
import { walkWavChunks, type WavChunk } from './walkWavChunks.ts';

/** A stretch of the file that holds sound. */
export interface SoundExtent {
  readonly offsetBytes: number;
  readonly bytes: number;
}

/** A WAV file whose header makes sense. */
export interface WavDescription {
  /** RIFX is big-endian; RF64 and BW64 carry 64-bit sizes. */
  readonly form: 'RIFF' | 'RIFX' | 'RF64' | 'BW64';
  readonly format: WavFormat;
  /** Where the sound is; more than one stretch in the rare file with several data chunks. */
  readonly extents: readonly SoundExtent[];
  /** Bytes of sound that the header claims for the first stretch. */
  readonly declaredDataBytes: number;
  /** Length of the sound that is there, seconds. */
  readonly durationSeconds: number;
  /** Whether claimed and real bytes differ: the real ones are used. */
  readonly isSizeWrong: boolean;
}

const RIFF_HEADER_BYTES = 12;
const FORMAT_BYTES_READ = 40;
const WAV_FORMS = ['RIFF', 'RIFX', 'RF64', 'BW64'] as const;
/** Size field of a chunk whose 64-bit size stands in the `ds64` chunk. */
const SIZE_IN_DS64 = 0xffff_ffff;

/**
 * Describes a WAV file by its header and its real length. Reads a few hundred bytes, whatever the size.
 *
 * @param fileBytes size of the file, bytes
 * @returns null when the file is no WAV at all
 * @throws {MediaRefused} `no-audio` without a data chunk, and what `parseWavFormat` refuses
 */
export async function readWavHeader(file: FileHandle, fileBytes: number): Promise<WavDescription | null> {
  const head = await readAt(file, RIFF_HEADER_BYTES, 0);
  const form = WAV_FORMS.find((known) => known === head.toString('latin1', 0, 4));
  if (form === undefined || head.toString('latin1', 8, 12) !== 'WAVE') return null;

  const isLittleEndian = form !== 'RIFX';
  const scope = { fileBytes, isLittleEndian };
  const { chunks } = await walkWavChunks(file, { ...scope, fromOffsetBytes: RIFF_HEADER_BYTES, stopAtId: 'data' });
  const data = chunks.find((chunk) => chunk.id === 'data');
  if (data === undefined) {
    throw new MediaRefused('no-audio', 'This WAV has a header but no sound in it. Record or save it again.');
  }
  const formatChunk = chunks.find((chunk) => chunk.id === 'fmt ');
  const formatBytes = Math.min(formatChunk?.declaredBytes ?? 0, FORMAT_BYTES_READ);
  const format = parseWavFormat(await readAt(file, formatBytes, formatChunk?.bodyOffsetBytes ?? 0), isLittleEndian);
  const declaredDataBytes = await dataSize(file, data, chunks);
  const sound = await findSound(file, { ...scope, data, declaredDataBytes });
  return { form, format, declaredDataBytes, ...sound, durationSeconds: durationOf(format, sound.extents) };
}

/** The size of the data chunk, from `ds64` where the 32-bit field defers to it (EBU Tech 3306). */
async function dataSize(file: FileHandle, data: WavChunk, chunks: readonly WavChunk[]): Promise<number> {
  const ds64 = chunks.find((chunk) => chunk.id === 'ds64');
  if (ds64 === undefined || data.declaredBytes !== SIZE_IN_DS64) return data.declaredBytes;
  const body = await readAt(file, 16, ds64.bodyOffsetBytes);
  return body.length === 16 ? Number(body.readBigUInt64LE(8)) : data.declaredBytes;
}

interface SoundScope {
  readonly fileBytes: number;
  readonly isLittleEndian: boolean;
  readonly data: WavChunk;
  readonly declaredDataBytes: number;
}
type FoundSound = Pick<WavDescription, 'extents' | 'isSizeWrong'>;

/**
 * Which bytes are sound. The claim stands when the file ends there or goes on with proper chunks.
 * A claim beyond the end is cut to what is there. Where unknown bytes follow, they are sound when
 * they outweigh the claim (a header that was never completed); otherwise they are a foreign tail.
 */
async function findSound(file: FileHandle, scope: SoundScope): Promise<FoundSound> {
  const { fileBytes, isLittleEndian, data, declaredDataBytes } = scope;
  const availableBytes = fileBytes - data.bodyOffsetBytes;
  const claimed = { offsetBytes: data.bodyOffsetBytes, bytes: declaredDataBytes };
  const available = { offsetBytes: data.bodyOffsetBytes, bytes: availableBytes };
  if (declaredDataBytes > availableBytes) return { extents: [available], isSizeWrong: true };

  const dataEndBytes = data.bodyOffsetBytes + declaredDataBytes + (declaredDataBytes % 2);
  const tail = await walkWavChunks(file, { fileBytes, isLittleEndian, fromOffsetBytes: dataEndBytes });
  if (tail.isComplete) {
    const further = tail.chunks
      .filter((chunk) => chunk.id === 'data')
      .map((chunk) => ({ offsetBytes: chunk.bodyOffsetBytes, bytes: chunk.declaredBytes }));
    return { extents: [claimed, ...further], isSizeWrong: false };
  }
  const isTailSound = availableBytes - declaredDataBytes > declaredDataBytes;
  return { extents: [isTailSound ? available : claimed], isSizeWrong: isTailSound };
}

function durationOf(format: WavFormat, extents: readonly SoundExtent[]): number {
  if (format.framesPerBlock === null) return sumOf(extents, ({ bytes }) => bytes) / format.byteRate;
  const blockCount = sumOf(extents, ({ bytes }) => Math.floor(bytes / format.blockAlignBytes));
  return (blockCount * format.framesPerBlock) / format.sampleRateHz;
}

function sumOf<Item>(items: readonly Item[], amount: (item: Item) => number): number {
  return items.reduce((sum, item) => sum + amount(item), 0);
}
