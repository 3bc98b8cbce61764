import { open, type FileHandle } from 'node:fs/promises';
import wavDecoder from 'wav-decoder';
import { readAt } from './readAt.ts';
import type { SoundExtent, WavDescription } from './readWavHeader.ts';
import type { SampleCollector } from './sampleCollector.ts';

const PLAIN_CODECS: ReadonlySet<string> = new Set(['pcm_u8', 'pcm_s16le', 'pcm_s24le', 'pcm_f32le']);
/** Frames decoded at a time: a few megabytes at most, and the event loop breathes in between. */
const FRAMES_PER_PIECE = 65_536;
const HEADER_BYTES = 44;

/** Whether wav-decoder reads this file rightly; it stumbles over everything but the oldest form of the header. */
export function isPlainWav(wav: WavDescription): boolean {
  return wav.form === 'RIFF' && !wav.format.isExtensible && PLAIN_CODECS.has(wav.format.codec);
}

/**
 * Decodes plain PCM and float WAV with wav-decoder. It never sees the header of the file: each piece of
 * sound gets a fresh one with true sizes, so that wrong sizes do no harm and a long file needs no second copy
 * in memory.
 *
 * @param collector takes the samples, full scale ±1; float samples come as they are, NaN included
 */
export async function decodePlainWav(
  path: string,
  wav: WavDescription,
  collector: SampleCollector,
  signal?: AbortSignal,
): Promise<void> {
  const file = await open(path, 'r');
  try {
    for (const extent of wav.extents) {
      for await (const sound of soundPieces(file, extent, wav.format.blockAlignBytes)) {
        signal?.throwIfAborted();
        collector.addPlanar(decodePiece(wav, sound));
      }
    }
  } finally {
    await file.close();
  }
}

/** Reads a stretch of sound in pieces of whole frames. */
async function* soundPieces(file: FileHandle, extent: SoundExtent, frameBytes: number): AsyncGenerator<Buffer> {
  const pieceBytes = FRAMES_PER_PIECE * frameBytes;
  const wholeBytes = extent.bytes - (extent.bytes % frameBytes);
  for (let doneBytes = 0; doneBytes < wholeBytes; doneBytes += pieceBytes) {
    yield await readAt(file, Math.min(pieceBytes, wholeBytes - doneBytes), extent.offsetBytes + doneBytes);
  }
}

function decodePiece(wav: WavDescription, sound: Buffer): readonly Float32Array[] {
  const { codec } = wav.format;
  const bytes = new Uint8Array(HEADER_BYTES + sound.length);
  writeHeader(new DataView(bytes.buffer), wav, sound.length);
  bytes.set(sound, HEADER_BYTES);
  // Unsigned bytes have their middle at 128, which the symmetric scale of wav-decoder would turn into an offset.
  const { channelData } = wavDecoder.decode.sync(bytes.buffer, { symmetric: codec !== 'pcm_u8' });
  if (codec === 'pcm_s24le') channelData.forEach(mendLowest24Bit);
  return channelData;
}

/** wav-decoder 1.3 takes the lowest 24-bit value, 0x800000, for +1, which no other value gives. */
function mendLowest24Bit(samples: Float32Array): void {
  for (let index = samples.indexOf(1); index >= 0; index = samples.indexOf(1, index)) samples[index] = -1;
}

function writeHeader(view: DataView, { format }: WavDescription, soundBytes: number): void {
  const tag = format.codec === 'pcm_f32le' ? 3 : 1;
  writeText(view, 0, 'RIFF');
  view.setUint32(4, HEADER_BYTES - 8 + soundBytes, true);
  writeText(view, 8, 'WAVEfmt ');
  view.setUint32(16, 16, true);
  view.setUint16(20, tag, true);
  view.setUint16(22, format.channelCount, true);
  view.setUint32(24, format.sampleRateHz, true);
  view.setUint32(28, format.sampleRateHz * format.blockAlignBytes, true);
  view.setUint16(32, format.blockAlignBytes, true);
  view.setUint16(34, format.bitsPerSample, true);
  writeText(view, 36, 'data');
  view.setUint32(40, soundBytes, true);
}

function writeText(view: DataView, offset: number, text: string): void {
  for (let index = 0; index < text.length; index++) view.setUint8(offset + index, text.charCodeAt(index));
}
