import { readFile } from 'node:fs/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { probeMedia } from '#server/media/probeMedia.ts';
import {
  createMediaFolder,
  pictureInput,
  silenceInput,
  toneInput,
  type MediaFolder,
} from '#tests/fixtures/media/makeMedia.ts';
import { withDeclaredDuration } from '#tests/fixtures/media/mp4Duration.ts';
import { seededBytes } from '#tests/fixtures/media/seededBytes.ts';
import { sine16, wavBytes } from '#tests/fixtures/media/wavBytes.ts';

let folder: MediaFolder;
beforeAll(async () => {
  folder = await createMediaFolder();
});
afterAll(() => folder.remove());

const FOUR_HOURS_SECONDS = 14_400;

describe('probeMedia', () => {
  it('refuses an empty file as empty-file', async () => {
    const path = await folder.write('empty.wav', '');
    await expect(probeMedia(path)).rejects.toMatchObject({
      name: 'MediaRefused',
      code: 'empty-file',
      message: expect.stringContaining('The file is empty (0 bytes).') as string,
    });
  });

  it.each([
    ['a WAV without samples', Buffer.alloc(0)],
    ['a WAV of 1 sample', Buffer.alloc(2)],
  ])('refuses %s as too-short', async (_kind, data) => {
    const path = await folder.write('short.wav', wavBytes({ data }));
    await expect(probeMedia(path)).rejects.toMatchObject({
      code: 'too-short',
      message: expect.stringContaining('0.0 s; at least 0.5 s needed') as string,
    });
  });

  it.each(['wav', 'm4a', 'flac', 'ogg'])('refuses 0.05 s of %s as too-short', async (extension) => {
    const path = await folder.ffmpeg(`short.${extension}`, ...toneInput(0.05));
    await expect(probeMedia(path)).rejects.toMatchObject({ code: 'too-short' });
  });

  it('refuses a WAV of 10 min and 1 s as too-long, and accepts one of 10 min', async () => {
    const bytes = (seconds: number) => wavBytes({ sampleRateHz: 8000, data: Buffer.alloc(seconds * 16_000) });
    await expect(probeMedia(await folder.write('long.wav', bytes(601)))).rejects.toMatchObject({
      code: 'too-long',
      message: expect.stringContaining('10 min 1 s; limit 10 min') as string,
    });
    const probe = await probeMedia(await folder.write('limit.wav', bytes(600)));
    expect(probe.declaredDurationSeconds).toBe(600);
  });

  it('refuses a rate of 1 Hz within 1 s, before anything is decoded', async () => {
    const path = await folder.write('bomb.wav', wavBytes({ sampleRateHz: 1, data: Buffer.alloc(88_000) }));
    const startSeconds = performance.now() / 1000;
    await expect(probeMedia(path)).rejects.toMatchObject({ code: 'unsupported-rate' });
    expect(performance.now() / 1000 - startSeconds).toBeLessThan(1);
  });

  it.each([
    ['claims 4 GiB', 0xffff_fff0],
    ['claims 100 bytes', 100],
  ])('accepts a WAV that %s of 88 kB with the warning header-mismatch', async (_claim, claimedDataBytes) => {
    const data = sine16({ toneHz: 300, sampleRateHz: 44_100, sampleCount: 44_100 });
    const probe = await probeMedia(await folder.write('claim.wav', wavBytes({ data, claimedDataBytes })));
    expect(probe).toMatchObject({ declaredDurationSeconds: 1, warnings: ['header-mismatch'] });
  });

  it.each([
    ['tone.m4a', 'mp4', 'aac', ['-c:a', 'aac']],
    ['tone.mov', 'mp4', 'pcm_s16le', ['-c:a', 'pcm_s16le']],
    ['tone.3gp', 'mp4', 'amr_nb', ['-ar', '8000', '-c:a', 'libopencore_amrnb']],
    ['tone.amr', 'amr', 'amr_nb', ['-ar', '8000', '-c:a', 'libopencore_amrnb']],
    ['tone.aac', 'aac', 'aac', []],
    ['tone.mp3', 'mp3', 'mp3', []],
    ['tone.webm', 'matroska', 'opus', ['-c:a', 'libopus']],
    ['tone.mka', 'matroska', 'vorbis', ['-c:a', 'libvorbis']],
    ['tone.ogg', 'ogg', 'opus', ['-c:a', 'libopus']],
    ['tone.oga', 'ogg', 'flac', ['-c:a', 'flac']],
    ['tone.flac', 'flac', 'flac', []],
    ['tone.caf', 'caf', 'pcm_s16be', []],
    ['tone.aiff', 'aiff', 'pcm_s16be', []],
    ['tone.w64', 'w64', 'pcm_s16le', []],
  ])('describes %s as %s with %s', async (name, container, codec, encoding) => {
    const probe = await probeMedia(await folder.ffmpeg(name, ...toneInput(2), ...encoding));
    expect(probe).toMatchObject({
      kind: 'stream',
      container,
      codec,
      channelCount: 1,
      audioTrackCount: 1,
      warnings: [],
    });
    expect(probe.sampleRateHz).toBe(codec === 'amr_nb' ? 8000 : 48_000);
    // Encoders pad by up to 0.1 s; raw AMR and AAC are estimated from their first frames, within a fifth.
    expect(Math.abs((probe.declaredDurationSeconds ?? 0) - 2)).toBeLessThan(0.4);
  });

  it('knows no duration of a webm that was streamed, and accepts it', async () => {
    const path = await folder.ffmpeg('live.webm', ...toneInput(2), '-c:a', 'libopus', '-f', 'webm', '-live', '1');
    expect(await probeMedia(path)).toMatchObject({ declaredDurationSeconds: null, warnings: [] });
  });

  it('refuses 4 h of Opus and of FLAC as too-long within 2 s', async () => {
    const opusMinute = await folder.ffmpeg('minute.ogg', ...silenceInput(60, 48_000), '-c:a', 'libopus', '-b:a', '6k');
    const repeats = ['-stream_loop', String(FOUR_HOURS_SECONDS / 60 - 1)];
    const opus = await folder.ffmpeg('long.ogg', ...repeats, '-i', opusMinute, '-c', 'copy');
    const flac = await folder.ffmpeg('long.flac', ...silenceInput(FOUR_HOURS_SECONDS, 8000));
    for (const path of [opus, flac]) {
      const startSeconds = performance.now() / 1000;
      await expect(probeMedia(path)).rejects.toMatchObject({
        code: 'too-long',
        message: expect.stringContaining('4 h 0 min; limit 10 min') as string,
      });
      expect(performance.now() / 1000 - startSeconds).toBeLessThan(2);
    }
  });

  it('accepts an MP4 of 5 s that declares 10 h', async () => {
    const mp4 = await readFile(await folder.ffmpeg('five.m4a', ...toneInput(5)));
    const path = await folder.write('ten-hours.m4a', withDeclaredDuration(mp4, 36_000, ['mvhd', 'mdhd', 'tkhd']));
    expect(await probeMedia(path)).toMatchObject({ kind: 'stream', codec: 'aac' });
  });

  it('refuses a video without sound as no-audio', async () => {
    const path = await folder.ffmpeg('mute.mp4', ...pictureInput(1));
    await expect(probeMedia(path)).rejects.toMatchObject({
      code: 'no-audio',
      message: expect.stringContaining('no sound track') as string,
    });
  });

  it('tells video beside the sound', async () => {
    const path = await folder.ffmpeg('video.mp4', ...pictureInput(1), ...toneInput(1), '-shortest');
    expect(await probeMedia(path)).toMatchObject({ hasVideo: true, codec: 'aac', audioStreamIndex: 1 });
  });

  it('chooses the default one of two sound tracks and says that there are two', async () => {
    const inputs = [...toneInput(1), ...toneInput(1), '-map', '0', '-map', '1'];
    const firstDefault = await folder.ffmpeg(
      'first.mka',
      ...inputs,
      '-disposition:0',
      'default',
      '-disposition:1',
      '0',
    );
    const secondDefault = await folder.ffmpeg(
      'second.mka',
      ...inputs,
      '-disposition:0',
      '0',
      '-disposition:1',
      'default',
    );
    expect(await probeMedia(firstDefault)).toMatchObject({ audioTrackCount: 2, audioStreamIndex: 0 });
    expect(await probeMedia(secondDefault)).toMatchObject({ audioTrackCount: 2, audioStreamIndex: 1 });
  });

  it('accepts an MP4 that ends before its index as unfinished', async () => {
    const whole = await readFile(await folder.ffmpeg('whole.m4a', ...toneInput(5)));
    const path = await folder.write('cut.m4a', whole.subarray(0, 20_000));
    expect(await probeMedia(path)).toMatchObject({ kind: 'unfinished', codec: null });
  });

  it('refuses sound in a codec that is not read as cannot-decode, by its name', async () => {
    const path = await folder.ffmpeg('speech.mka', ...toneInput(1), '-c:a', 'ac3');
    await expect(probeMedia(path)).rejects.toMatchObject({
      code: 'cannot-decode',
      message: expect.stringContaining('ac3') as string,
    });
  });

  it('refuses 500 kB of random bytes as not-audio', async () => {
    await expect(probeMedia(await folder.write('noise.mp3', seededBytes(500_000, 34)))).rejects.toMatchObject({
      code: 'not-audio',
    });
  });

  it('refuses a file with the first bytes of an Ogg and nothing else of it as cannot-decode', async () => {
    const bytes = Buffer.concat([Buffer.from('OggS'), seededBytes(5000, 1)]);
    await expect(probeMedia(await folder.write('fake.ogg', bytes))).rejects.toMatchObject({ code: 'cannot-decode' });
  });

  it('refuses what cannot be examined in its time as probe-timed-out', async () => {
    const path = await folder.ffmpeg('slow.m4a', ...toneInput(1));
    await expect(probeMedia(path, { wallSeconds: 0.001 })).rejects.toMatchObject({ code: 'probe-timed-out' });
  });

  it('examines 12 files at once within 2 s each', async () => {
    const path = await folder.ffmpeg('many.m4a', ...toneInput(1));
    const probes = await Promise.all(Array.from({ length: 12 }, () => probeMedia(path)));
    expect(probes.map(({ codec }) => codec)).toEqual(Array.from({ length: 12 }, () => 'aac'));
  });
});
