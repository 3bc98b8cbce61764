import { open } from 'node:fs/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readWavHeader, type WavDescription } from '#server/media/readWavHeader.ts';
import { createMediaFolder, toneInput, type MediaFolder } from '#tests/fixtures/media/makeMedia.ts';
import { chunkBytes, riffBytes, sine16, wavBytes, type WavRecipe } from '#tests/fixtures/media/wavBytes.ts';

let folder: MediaFolder;
beforeAll(async () => {
  folder = await createMediaFolder();
});
afterAll(() => folder.remove());

/** One second of sound at 44.1 kHz: 88200 bytes. */
const data = sine16({ toneHz: 300, sampleRateHz: 44_100, sampleCount: 44_100 });

async function describeFile(path: string): Promise<WavDescription | null> {
  const file = await open(path, 'r');
  try {
    return await readWavHeader(file, (await file.stat()).size);
  } finally {
    await file.close();
  }
}

async function describeBytes(bytes: Buffer): Promise<WavDescription | null> {
  return describeFile(await folder.write('a.wav', bytes));
}

async function describeWav(recipe: Partial<WavRecipe> = {}): Promise<WavDescription | null> {
  return describeBytes(wavBytes({ data, ...recipe }));
}

describe('readWavHeader', () => {
  it('describes a plain file by its true size', async () => {
    expect(await describeWav()).toMatchObject({
      form: 'RIFF',
      extents: [{ offsetBytes: 44, bytes: 88_200 }],
      declaredDataBytes: 88_200,
      durationSeconds: 1,
      isSizeWrong: false,
    });
  });

  it('returns null for a file that is no WAV, and for one of 4 bytes', async () => {
    expect(await describeBytes(Buffer.from('OggS and so on, long enough'))).toBeNull();
    expect(await describeBytes(Buffer.from('RIFF'))).toBeNull();
  });

  it.each([
    ['4 GiB', 0xffff_fff0],
    ['one byte too many', 88_201],
    ['100 bytes', 100],
    ['0 bytes', 0],
  ])('uses the 88200 bytes that are there when the header claims %s', async (_claim, claimedDataBytes) => {
    const wav = await describeWav({ claimedDataBytes });
    expect(wav).toMatchObject({ declaredDataBytes: claimedDataBytes, durationSeconds: 1, isSizeWrong: true });
  });

  it('finds the sound behind other chunks, odd ones padded or not', async () => {
    const padded = chunkBytes('LIST', Buffer.from('INFOabc'));
    const unpadded = padded.subarray(0, padded.length - 1);
    for (const beforeData of [chunkBytes('JUNK', Buffer.alloc(4096)), padded, unpadded]) {
      expect(await describeWav({ beforeData })).toMatchObject({ durationSeconds: 1, isSizeWrong: false });
    }
  });

  it('leaves out proper chunks behind the sound', async () => {
    const afterData = Buffer.concat([chunkBytes('LIST', Buffer.from('INFOabc')), chunkBytes('id3 ', Buffer.alloc(99))]);
    expect(await describeWav({ afterData })).toMatchObject({ durationSeconds: 1, isSizeWrong: false });
  });

  it('leaves out a foreign tail that is shorter than the sound', async () => {
    const afterData = Buffer.from('<script>alert(1)</script>');
    expect(await describeWav({ afterData })).toMatchObject({ durationSeconds: 1, isSizeWrong: false });
  });

  it('notes that the sound goes on in a second data chunk', async () => {
    const wav = await describeWav({ afterData: chunkBytes('data', data) });
    expect(wav).toMatchObject({ durationSeconds: 2, isSizeWrong: false, extents: { length: 2 } });
  });

  it('counts whole frames only', async () => {
    expect((await describeWav({ data: data.subarray(0, 44_101) }))?.durationSeconds).toBe(0.5);
  });

  it('refuses a header with nothing behind it as no-audio', async () => {
    const bytes = Buffer.from('RIFF\x24\0\0\0WAVE', 'latin1');
    await expect(describeBytes(bytes)).rejects.toMatchObject({ code: 'no-audio' });
  });

  it('refuses sound without a format as bad-header', async () => {
    await expect(describeBytes(riffBytes([chunkBytes('data', data)]))).rejects.toMatchObject({ code: 'bad-header' });
  });

  it('ends on 100,000 empty chunks instead of reading them all', async () => {
    const chunks = Array.from({ length: 100_000 }, () => chunkBytes('JUNK', Buffer.alloc(0)));
    await expect(describeBytes(riffBytes(chunks))).rejects.toMatchObject({ code: 'no-audio' });
  });

  it.each([
    ['pcm_u8', 'RIFF', false],
    ['pcm_s24le', 'RIFF', true],
    ['pcm_f32le', 'RIFF', true],
    ['pcm_mulaw', 'RIFF', false],
    ['adpcm_ms', 'RIFF', false],
    ['adpcm_ima_wav', 'RIFF', false],
  ])('agrees with ffmpeg about the %s it wrote', async (codec, form, isExtensible) => {
    const path = await folder.ffmpeg(`${codec}.wav`, ...toneInput(2), '-c:a', codec);
    const wav = await describeFile(path);
    expect(wav).toMatchObject({ form, isSizeWrong: false, format: { codec, sampleRateHz: 48_000, isExtensible } });
    // The last block of ADPCM is filled up: at most one block of 2041 samples.
    expect(wav?.durationSeconds).toBeGreaterThanOrEqual(2);
    expect(wav?.durationSeconds).toBeLessThan(2 + 2041 / 48_000);
  });

  it('reads 64-bit sizes from RF64 as ffmpeg writes it', async () => {
    const path = await folder.ffmpeg('rf64.wav', ...toneInput(2), '-rf64', 'always');
    expect(await describeFile(path)).toMatchObject({ form: 'RF64', durationSeconds: 2, isSizeWrong: false });
  });

  it('reads big-endian RIFX as sox writes it', async () => {
    const path = await folder.sox('rifx.wav', ['-n', '-r', '48000', '-b', '16', '-B'], ['synth', '2', 'sine', '300']);
    expect(await describeFile(path)).toMatchObject({
      form: 'RIFX',
      durationSeconds: 2,
      format: { codec: 'pcm_s16be', sampleRateHz: 48_000 },
    });
  });
});
