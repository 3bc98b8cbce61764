import { readFile } from 'node:fs/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { decodeAudio, type DecodedAudio } from '#server/media/decodeAudio.ts';
import { DecoderCrashed, MediaRefused, MediaUnreadable } from '#server/media/mediaErrors.ts';
import { probeMedia } from '#server/media/probeMedia.ts';
import {
  createMediaFolder,
  pictureInput,
  silenceInput,
  toneInput,
  type MediaFolder,
} from '#tests/fixtures/media/makeMedia.ts';
import { withDeclaredDuration } from '#tests/fixtures/media/mp4Duration.ts';
import { createSeededUint32 } from '#tests/fixtures/media/seededBytes.ts';
import { sine16, wavBytes } from '#tests/fixtures/media/wavBytes.ts';

let folder: MediaFolder;
beforeAll(async () => {
  folder = await createMediaFolder();
});
afterAll(() => folder.remove());

async function decode(path: string): Promise<DecodedAudio> {
  return decodeAudio(path, await probeMedia(path));
}

describe('decodeAudio on damaged files', () => {
  it.each([
    ['4 GiB', 0xffff_fff0],
    ['100 bytes', 100],
    ['0 bytes', 0],
  ])('uses all 44100 samples of a WAV that claims %s', async (_claim, claimedDataBytes) => {
    const data = sine16({ toneHz: 300, sampleRateHz: 44_100, sampleCount: 44_100 });
    const decoded = await decode(await folder.write('claim.wav', wavBytes({ data, claimedDataBytes })));
    expect(decoded).toMatchObject({ durationSeconds: 1, warnings: ['header-mismatch'] });
  });

  it('uses all samples of a µ-law WAV that claims 100 bytes, where ffmpeg alone would stop', async () => {
    const wav = await readFile(await folder.ffmpeg('law.wav', ...toneInput(1), '-c:a', 'pcm_mulaw'));
    wav.writeUInt32LE(100, wav.indexOf('data') + 4);
    const decoded = await decode(await folder.write('law.wav', wav));
    expect(decoded).toMatchObject({ durationSeconds: 1, decoder: 'ffmpeg', warnings: ['header-mismatch'] });
  });

  it('fails an MP4 that ends before its index as truncated', async () => {
    const whole = await readFile(await folder.ffmpeg('whole.m4a', ...toneInput(10)));
    const path = await folder.write('cut.m4a', whole.subarray(0, 40_000));
    await expect(decode(path)).rejects.toMatchObject({
      name: 'MediaUnreadable',
      code: 'truncated',
      message: expect.stringContaining('recording was not finished') as string,
    });
  });

  it('uses the 5 of 10 s of a webm that was cut in half, with the warning partial', async () => {
    const inputs = [...pictureInput(10), ...toneInput(10)];
    const whole = await readFile(await folder.ffmpeg('whole.webm', ...inputs, '-c:v', 'libvpx', '-c:a', 'libopus'));
    const decoded = await decode(await folder.write('cut.webm', whole.subarray(0, whole.length / 2)));
    expect(decoded.warnings).toEqual(['partial']);
    expect(decoded.durationSeconds).toBeGreaterThan(4);
    expect(decoded.durationSeconds).toBeLessThan(6);
    expect(decoded.declaredDurationSeconds).toBeCloseTo(10, 1);
  });

  it.each([
    ['m4a', ['-movflags', '+faststart']],
    ['flac', []],
    ['mp3', []],
    ['caf', []],
  ])('uses the half of a %s that is there, with the warning partial', async (extension, encoding) => {
    const whole = await readFile(await folder.ffmpeg(`whole.${extension}`, ...toneInput(6), ...encoding));
    const decoded = await decode(await folder.write(`cut.${extension}`, whole.subarray(0, whole.length / 2)));
    expect(decoded.warnings).toContain('partial');
    expect(decoded.durationSeconds).toBeGreaterThan(2);
    expect(decoded.durationSeconds).toBeLessThan(4);
  });

  it('fails 4 h of sound that declare 5 s as too-long, by the samples', async () => {
    const mp4 = await readFile(await folder.ffmpeg('long.m4a', ...silenceInput(1000, 8000), '-b:a', '8k'));
    const path = await folder.write('liar.m4a', withDeclaredDuration(mp4, 5, ['mvhd', 'mdhd']));
    await expect(decode(path)).rejects.toMatchObject({
      name: 'MediaUnreadable',
      code: 'too-long',
      message: expect.stringContaining('limit 10 min') as string,
    });
  });

  it('accepts 5 s that declare 10 h by their real length', async () => {
    const mp4 = await readFile(await folder.ffmpeg('five.m4a', ...toneInput(5)));
    const path = await folder.write('ten-hours.m4a', withDeclaredDuration(mp4, 36_000, ['mvhd', 'mdhd', 'tkhd']));
    expect((await decode(path)).durationSeconds).toBeCloseTo(5, 1);
  });

  it('accepts exactly 10 min although the encoder pads them', async () => {
    const { durationSeconds, warnings } = await decode(await folder.ffmpeg('limit.m4a', ...silenceInput(600, 8000)));
    expect({ durationSeconds, warnings }).toEqual({ durationSeconds: 600, warnings: [] });
  });

  it('fails a file whose sound is all damaged as cannot-decode', async () => {
    const mp4 = await readFile(await folder.ffmpeg('whole.m4a', ...toneInput(2)));
    const mediaStart = mp4.indexOf('mdat') + 4;
    mp4.fill(0xff, mediaStart, mp4.indexOf('moov') - 4);
    await expect(decode(await folder.write('damaged.m4a', mp4))).rejects.toMatchObject({ code: 'cannot-decode' });
  });

  it.each([
    ['m4a', []],
    ['mp3', []],
    ['ogg', ['-c:a', 'libopus']],
    ['webm', ['-c:a', 'libopus']],
    ['flac', []],
    ['wav', []],
    ['amr', ['-ar', '8000', '-c:a', 'libopencore_amrnb']],
    ['caf', []],
  ])('survives 5 seeded damages of %s: samples or a typed refusal', async (extension, encoding) => {
    const whole = await readFile(await folder.ffmpeg(`flip.${extension}`, ...toneInput(1), ...encoding));
    const next = createSeededUint32(35);
    for (let round = 0; round < 5; round++) {
      const damaged = Buffer.from(whole);
      // One flipped bit in every two hundred bytes, and always some in the header.
      for (let flip = 0; flip < 4 + whole.length / 200; flip++) {
        const index = flip < 4 ? next() % 200 : next() % whole.length;
        damaged.writeUInt8(damaged.readUInt8(index) ^ (1 << (next() % 8)), index);
      }
      const path = await folder.write(`flipped.${extension}`, damaged);
      const outcome: unknown = await decode(path).catch((error: unknown) => error);
      if (outcome instanceof Error) {
        expect([MediaRefused, MediaUnreadable, DecoderCrashed]).toContain(outcome.constructor);
      } else {
        expect((outcome as DecodedAudio).durationSeconds).toBeGreaterThanOrEqual(0.5);
      }
    }
  });
});
