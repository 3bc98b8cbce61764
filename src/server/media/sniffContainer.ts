import type { FileHandle } from 'node:fs/promises';
import { readAt } from './readAt.ts';

/** The kinds of file that are read, by what their first bytes say. */
export type MediaContainer =
  'wav' | 'w64' | 'mp4' | 'matroska' | 'ogg' | 'mp3' | 'flac' | 'aac' | 'amr' | 'aiff' | 'caf';

const HEAD_BYTES = 16;
/** Sony Wave64 begins with a GUID whose text part is `riff`. */
const W64_MAGIC = Buffer.from('726966662e91cf11a5d628db04c10000', 'hex');
const EBML_MAGIC = Buffer.from('1a45dfa3', 'hex');
/** First boxes of MP4, 3GP and QuickTime files; the older ones have no `ftyp`. */
const ISO_FIRST_BOXES = ['ftyp', 'moov', 'mdat', 'wide', 'free', 'skip', 'pnot'];
const ID3_HEADER_BYTES = 10;

/**
 * Names the container by its magic bytes; name and media type of an upload say nothing. What is not
 * recognised never reaches a demuxer, so that playlists, scripts, pictures and archives end here.
 */
export async function sniffContainer(file: FileHandle): Promise<MediaContainer | null> {
  const head = await readAt(file, HEAD_BYTES, 0);
  if (head.toString('latin1', 0, 3) !== 'ID3' || head.length < ID3_HEADER_BYTES) return containerOf(head);
  const afterTag = containerOf(await readAt(file, HEAD_BYTES, ID3_HEADER_BYTES + id3BodyBytes(head)));
  return afterTag === 'aac' || afterTag === 'flac' ? afterTag : 'mp3';
}

/** Whether the file is a ZIP archive, full or empty (PKWARE APPNOTE, 4.3.7 and 4.3.16). */
export async function isZipArchive(file: FileHandle): Promise<boolean> {
  const magic = (await readAt(file, 4, 0)).toString('latin1');
  return magic === 'PK\x03\x04' || magic === 'PK\x05\x06';
}

function containerOf(head: Buffer): MediaContainer | null {
  const id = head.toString('latin1', 0, 4);
  const kind = head.toString('latin1', 8, 12);
  if (['RIFF', 'RIFX', 'RF64', 'BW64'].includes(id) && kind === 'WAVE') return 'wav';
  if (id === 'FORM' && (kind === 'AIFF' || kind === 'AIFC')) return 'aiff';
  if (id === 'OggS') return 'ogg';
  if (id === 'fLaC') return 'flac';
  if (id === 'caff') return 'caf';
  if (head.toString('latin1', 0, 5) === '#!AMR') return 'amr';
  if (ISO_FIRST_BOXES.includes(head.toString('latin1', 4, 8))) return 'mp4';
  if (head.subarray(0, 4).equals(EBML_MAGIC)) return 'matroska';
  if (head.equals(W64_MAGIC)) return 'w64';
  return mpegAudioOf(head);
}

/** MPEG audio frames start with eleven set bits (ISO/IEC 11172-3, 2.4.1.3); ADTS with twelve and layer 0. */
function mpegAudioOf(head: Buffer): 'mp3' | 'aac' | null {
  const [sync = 0, second = 0, third = 0] = head;
  if (sync !== 0xff || (second & 0xe0) !== 0xe0) return null;
  if ((second & 0xf6) === 0xf0) return 'aac';
  const isVersionReserved = (second & 0x18) === 0x08;
  const isLayerReserved = (second & 0x06) === 0;
  const isBitRateBad = (third & 0xf0) === 0xf0 || (third & 0xf0) === 0;
  const isRateReserved = (third & 0x0c) === 0x0c;
  return isVersionReserved || isLayerReserved || isBitRateBad || isRateReserved ? null : 'mp3';
}

/**
 * Bytes of an ID3v2 tag after its header: four bytes of seven bits (ID3v2.4, section 3.1), so that a tag
 * with a large picture is stepped over and not read.
 */
export function id3BodyBytes(head: Buffer): number {
  return [6, 7, 8, 9].reduce((size, index) => size * 128 + ((head[index] ?? 0) & 0x7f), 0);
}
