import { MAXIMUM_CHANNELS, MAXIMUM_SAMPLE_RATE_HZ, MINIMUM_SAMPLE_RATE_HZ } from '#lib/schemas/uploadLimits.ts';
import { MediaRefused, tooManyChannelsMessage, unsupportedRateMessage } from './mediaErrors.ts';

/** What the `fmt ` chunk of a WAV says. */
export interface WavFormat {
  /** Codec in the spelling of the decoder, such as `pcm_s16le`. */
  readonly codec: string;
  readonly channelCount: number;
  readonly sampleRateHz: number;
  /** Bits of one stored sample; for compressed sound what the header says. */
  readonly bitsPerSample: number;
  /** Bytes of one block: one frame (a sample of every channel) for PCM, one packet for compressed sound. */
  readonly blockAlignBytes: number;
  /** Frames a second divided by blocks a second; null where only the byte rate tells the length. */
  readonly framesPerBlock: number | null;
  readonly byteRate: number;
  readonly isExtensible: boolean;
}

/** Format tags (Microsoft, mmreg.h). */
const TAG_PCM = 0x0001;
const TAG_ADPCM_MS = 0x0002;
const TAG_FLOAT = 0x0003;
const TAG_A_LAW = 0x0006;
const TAG_MU_LAW = 0x0007;
const TAG_ADPCM_IMA = 0x0011;
const TAG_GSM = 0x0031;
const TAG_MP3 = 0x0055;
const TAG_EXTENSIBLE = 0xfffe;

/** Sample widths that each uncompressed tag may have, bits. */
const ALLOWED_BITS: Partial<Record<number, readonly number[]>> = {
  [TAG_PCM]: [8, 16, 24, 32],
  [TAG_FLOAT]: [32, 64],
  [TAG_A_LAW]: [8],
  [TAG_MU_LAW]: [8],
};
const COMPRESSED_CODECS: Partial<Record<number, string>> = {
  [TAG_ADPCM_MS]: 'adpcm_ms',
  [TAG_ADPCM_IMA]: 'adpcm_ima_wav',
  [TAG_GSM]: 'gsm_ms',
  [TAG_MP3]: 'mp3',
};

/** Bytes of the oldest form of the chunk, and of the extensible one. */
const PLAIN_FORMAT_BYTES = 16;
const EXTENSIBLE_FORMAT_BYTES = 40;
/** More channels or a higher rate than this is damage, not a recording beyond our limits. */
const PLAUSIBLE_CHANNELS = 64;
const PLAUSIBLE_SAMPLE_RATE_HZ = 10_000_000;

/**
 * Reads and judges the body of a `fmt ` chunk.
 *
 * @param body shape [bytes], as many as the file holds, up to 40
 * @param isLittleEndian false for RIFX
 * @throws {MediaRefused} `bad-header` where the fields contradict each other or make no sense (zero or 65535
 *   channels, rate 0 or above 10 MHz, a sample width that the encoding lacks, a block size that does not fit);
 *   `too-many-channels`, `unsupported-rate` beyond the limits; `cannot-decode` for an encoding that is not read
 */
export function parseWavFormat(body: Buffer, isLittleEndian: boolean): WavFormat {
  if (body.length < PLAIN_FORMAT_BYTES) throw badHeader('its format block is too short');
  const view = new DataView(body.buffer, body.byteOffset, body.byteLength);
  const tag = view.getUint16(0, isLittleEndian);
  const isExtensible = tag === TAG_EXTENSIBLE;
  if (isExtensible && body.length < EXTENSIBLE_FORMAT_BYTES) throw badHeader('its format block is too short');

  const encoding = isExtensible ? view.getUint16(24, isLittleEndian) : tag;
  const fields = {
    channelCount: view.getUint16(2, isLittleEndian),
    sampleRateHz: view.getUint32(4, isLittleEndian),
    byteRate: view.getUint32(8, isLittleEndian),
    blockAlignBytes: view.getUint16(12, isLittleEndian),
    bitsPerSample: view.getUint16(14, isLittleEndian),
  };
  if (fields.channelCount === 0 || fields.channelCount > PLAUSIBLE_CHANNELS) {
    throw badHeader(`it claims ${fields.channelCount} channels`);
  }
  if (fields.sampleRateHz === 0 || fields.sampleRateHz > PLAUSIBLE_SAMPLE_RATE_HZ) {
    throw badHeader(`it claims a sample rate of ${fields.sampleRateHz} Hz`);
  }
  const samplesPerBlock = body.length >= 20 ? view.getUint16(18, isLittleEndian) : 0;
  const coding = ALLOWED_BITS[encoding]
    ? uncompressedCoding(encoding, fields, isLittleEndian)
    : compressedCoding(encoding, fields, samplesPerBlock);
  refuseBeyondLimits(fields);
  return { ...fields, ...coding, isExtensible };
}

type FormatFields = Pick<WavFormat, 'channelCount' | 'sampleRateHz' | 'byteRate' | 'blockAlignBytes' | 'bitsPerSample'>;
type Coding = Pick<WavFormat, 'codec' | 'framesPerBlock'>;

function uncompressedCoding(encoding: number, fields: FormatFields, isLittleEndian: boolean): Coding {
  const { bitsPerSample, channelCount, blockAlignBytes } = fields;
  if (!ALLOWED_BITS[encoding]?.includes(bitsPerSample)) throw badHeader(`it claims ${bitsPerSample} bits per sample`);
  if (blockAlignBytes * 8 !== channelCount * bitsPerSample) {
    throw badHeader(`its block size of ${blockAlignBytes} bytes does not fit its channels and bits`);
  }
  return { codec: uncompressedCodec(encoding, bitsPerSample, isLittleEndian), framesPerBlock: 1 };
}

function uncompressedCodec(encoding: number, bitsPerSample: number, isLittleEndian: boolean): string {
  if (encoding === TAG_A_LAW) return 'pcm_alaw';
  if (encoding === TAG_MU_LAW) return 'pcm_mulaw';
  if (encoding === TAG_PCM && bitsPerSample === 8) return 'pcm_u8';
  return `pcm_${encoding === TAG_FLOAT ? 'f' : 's'}${bitsPerSample}${isLittleEndian ? 'le' : 'be'}`;
}

function compressedCoding(encoding: number, fields: FormatFields, samplesPerBlock: number): Coding {
  const codec = COMPRESSED_CODECS[encoding];
  if (codec === undefined) {
    const tag = `0x${encoding.toString(16).padStart(4, '0')}`;
    throw new MediaRefused('cannot-decode', `This WAV uses the encoding ${tag}, which is not read. Save it as PCM.`);
  }
  if (fields.blockAlignBytes === 0 || fields.byteRate === 0) throw badHeader('it claims blocks of 0 bytes');
  const isBlockCoded = codec.startsWith('adpcm');
  if (isBlockCoded && samplesPerBlock === 0) throw badHeader('it claims blocks without samples');
  return { codec, framesPerBlock: isBlockCoded ? samplesPerBlock : null };
}

function refuseBeyondLimits({ channelCount, sampleRateHz }: FormatFields): void {
  if (channelCount > MAXIMUM_CHANNELS) {
    throw new MediaRefused('too-many-channels', tooManyChannelsMessage(channelCount));
  }
  if (sampleRateHz < MINIMUM_SAMPLE_RATE_HZ || sampleRateHz > MAXIMUM_SAMPLE_RATE_HZ) {
    throw new MediaRefused('unsupported-rate', unsupportedRateMessage(sampleRateHz));
  }
}

function badHeader(fault: string): MediaRefused {
  return new MediaRefused('bad-header', `The header of this WAV is damaged: ${fault}. Save or record it again.`);
}
