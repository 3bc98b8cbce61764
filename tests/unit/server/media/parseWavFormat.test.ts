import { describe, expect, it } from 'vitest';
import { parseWavFormat } from '#server/media/parseWavFormat.ts';
import { wavBytes, type WavRecipe } from '#tests/fixtures/media/wavBytes.ts';

const FORMAT_BODY_OFFSET = 20;
const FORMAT_BODY_BYTES = 16;

function formatBody(recipe: Omit<WavRecipe, 'data'>): Buffer {
  const wav = wavBytes({ ...recipe, data: Buffer.alloc(0) });
  return wav.subarray(FORMAT_BODY_OFFSET, FORMAT_BODY_OFFSET + FORMAT_BODY_BYTES);
}

/** Sub-format GUID tail of KSDATAFORMAT_SUBTYPE_* (Microsoft, ksmedia.h). */
const SUBTYPE_TAIL = '000000001000800000aa00389b71';

function extensibleBody(recipe: Omit<WavRecipe, 'data'>, encoding: number): Buffer {
  const extension = Buffer.alloc(24);
  extension.writeUInt16LE(22, 0);
  extension.writeUInt16LE(encoding, 8);
  extension.write(SUBTYPE_TAIL, 10, 'hex');
  return Buffer.concat([formatBody({ ...recipe, formatTag: 0xfffe }), extension]);
}

describe('parseWavFormat', () => {
  it.each([
    ['no channels', { channelCount: 0, blockAlignBytes: 2 }, 'bad-header'],
    ['65535 channels', { channelCount: 65_535 }, 'bad-header'],
    ['9 channels', { channelCount: 9 }, 'too-many-channels'],
    ['rate 0', { sampleRateHz: 0 }, 'bad-header'],
    ['rate 1 Hz', { sampleRateHz: 1 }, 'unsupported-rate'],
    ['rate 7999 Hz', { sampleRateHz: 7999 }, 'unsupported-rate'],
    ['rate 192001 Hz', { sampleRateHz: 192_001 }, 'unsupported-rate'],
    ['rate 4294967295 Hz', { sampleRateHz: 4_294_967_295 }, 'bad-header'],
    ['0 bits', { bitsPerSample: 0 }, 'bad-header'],
    ['7 bits', { bitsPerSample: 7, blockAlignBytes: 1 }, 'bad-header'],
    ['64 bits of PCM', { bitsPerSample: 64 }, 'bad-header'],
    ['16 bits of float', { formatTag: 3 }, 'bad-header'],
    ['a block size that does not fit', { blockAlignBytes: 3 }, 'bad-header'],
    ['a block size of 0', { blockAlignBytes: 0 }, 'bad-header'],
    ['an encoding that is not read', { formatTag: 0x0161 }, 'cannot-decode'],
    ['ADPCM without samples in its blocks', { formatTag: 2, bitsPerSample: 4, blockAlignBytes: 1024 }, 'bad-header'],
  ])('refuses %s', (_fault, recipe, code) => {
    expect(() => parseWavFormat(formatBody(recipe), true)).toThrow(expect.objectContaining({ code }));
  });

  it('names the rate and the allowed range when it refuses 1 Hz', () => {
    expect(() => parseWavFormat(formatBody({ sampleRateHz: 1 }), true)).toThrow(
      'The sample rate is 1 Hz; 8 to 192 kHz can be measured.',
    );
  });

  it.each([
    ['8-bit PCM', { bitsPerSample: 8 }, 'pcm_u8'],
    ['16-bit PCM', {}, 'pcm_s16le'],
    ['24-bit PCM', { bitsPerSample: 24, channelCount: 8, sampleRateHz: 192_000 }, 'pcm_s24le'],
    ['32-bit PCM', { bitsPerSample: 32 }, 'pcm_s32le'],
    ['32-bit float', { formatTag: 3, bitsPerSample: 32 }, 'pcm_f32le'],
    ['64-bit float', { formatTag: 3, bitsPerSample: 64 }, 'pcm_f64le'],
    ['A-law at 8 kHz', { formatTag: 6, bitsPerSample: 8, sampleRateHz: 8000 }, 'pcm_alaw'],
    ['µ-law', { formatTag: 7, bitsPerSample: 8 }, 'pcm_mulaw'],
  ])('reads %s', (_kind, recipe, codec) => {
    const format = parseWavFormat(formatBody(recipe), true);
    expect(format).toMatchObject({ codec, framesPerBlock: 1, isExtensible: false });
  });

  it('reads the encoding of the extensible form from its sub-format', () => {
    expect(parseWavFormat(extensibleBody({ bitsPerSample: 32 }, 3), true)).toMatchObject({
      codec: 'pcm_f32le',
      isExtensible: true,
    });
  });

  it('refuses an extensible form that is cut off', () => {
    const cut = extensibleBody({}, 1).subarray(0, 30);
    expect(() => parseWavFormat(cut, true)).toThrow(expect.objectContaining({ code: 'bad-header' }));
  });

  it('refuses a format block of 15 bytes', () => {
    expect(() => parseWavFormat(formatBody({}).subarray(0, 15), true)).toThrow(
      expect.objectContaining({ code: 'bad-header' }),
    );
  });
});
