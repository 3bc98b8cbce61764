import { execFile } from 'node:child_process';
import { access, readFile, stat } from 'node:fs/promises';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { probeMedia } from '#server/media/probeMedia.ts';
import { transcodeForPlayback } from '#server/media/transcodeForPlayback.ts';
import { createMediaFolder, pictureInput, toneInput, type MediaFolder } from '#tests/fixtures/media/makeMedia.ts';
import { toneHz } from '#tests/fixtures/media/soundFigures.ts';
import { sine16, wavBytes } from '#tests/fixtures/media/wavBytes.ts';

const run = promisify(execFile);
let folder: MediaFolder;
beforeAll(async () => {
  folder = await createMediaFolder();
});
afterAll(() => folder.remove());

async function transcode(path: string): Promise<{ outputPath: string; bytes: number }> {
  const outputPath = folder.path('playback.mp3');
  const { bytes } = await transcodeForPlayback(path, await probeMedia(path), outputPath);
  return { outputPath, bytes };
}

interface Description {
  readonly streams: readonly Record<string, unknown>[];
  readonly format: { readonly duration: string; readonly tags?: Record<string, string> };
}

async function describeByFfprobe(path: string): Promise<Description> {
  const { stdout } = await run('ffprobe', ['-v', 'error', '-show_format', '-show_streams', '-of', 'json', path]);
  return JSON.parse(stdout) as Description;
}

describe('transcodeForPlayback', () => {
  it.each([
    ['m4a', []],
    ['webm', ['-c:a', 'libopus']],
    ['wav', ['-c:a', 'pcm_mulaw']],
    ['flac', ['-ar', '192000']],
    ['amr', ['-ar', '8000', '-c:a', 'libopencore_amrnb']],
  ])('makes an MP3 of 48 kHz and the same 5 s of %s', async (extension, encoding) => {
    const { outputPath, bytes } = await transcode(
      await folder.ffmpeg(`a.${extension}`, ...toneInput(5, 800), ...encoding),
    );
    const { streams, format } = await describeByFfprobe(outputPath);
    expect(streams).toMatchObject([{ codec_name: 'mp3', sample_rate: '48000' }]);
    // An MP3 frame is 24 ms; the encoder adds up to three of them.
    expect(Math.abs(Number(format.duration) - 5)).toBeLessThan(0.1);
    expect(bytes).toBe((await stat(outputPath)).size);
  });

  it('keeps the pitch of the tone', async () => {
    const { outputPath } = await transcode(await folder.ffmpeg('a.m4a', ...toneInput(2, 800)));
    const raw = await run('ffmpeg', ['-v', 'error', '-i', outputPath, '-f', 'f32le', 'pipe:1'], { encoding: 'buffer' });
    const samples = new Float32Array(new Uint8Array(raw.stdout).buffer);
    expect(toneHz(samples.subarray(24_000, 72_000), 48_000)).toBeCloseTo(800, 1);
  });

  it('carries no place, title, device, chapter or picture over', async () => {
    const metadata = ['location=+48.85+002.35/', 'title=<img src=x onerror=alert(1)>', 'make=Phone', 'comment=mine'];
    const path = await folder.ffmpeg(
      'tagged.mp4',
      ...pictureInput(1),
      ...toneInput(1),
      '-movflags',
      'use_metadata_tags',
      ...metadata.flatMap((entry) => ['-metadata', entry]),
    );
    expect((await readFile(path)).includes('48.85')).toBe(true);
    const { outputPath } = await transcode(path);
    const mp3 = await readFile(outputPath);
    for (const text of ['48.85', '<img', 'Phone', 'mine', 'ID3', 'TAG']) expect(mp3.includes(text)).toBe(false);
    const { streams, format } = await describeByFfprobe(outputPath);
    expect({ streamCount: streams.length, tags: format.tags }).toEqual({ streamCount: 1, tags: undefined });
  });

  it('plays all 5 s of a WAV that claims 100 bytes', async () => {
    const data = sine16({ toneHz: 300, sampleRateHz: 44_100, sampleCount: 5 * 44_100 });
    const { outputPath } = await transcode(await folder.write('claim.wav', wavBytes({ data, claimedDataBytes: 100 })));
    expect(Number((await describeByFfprobe(outputPath)).format.duration)).toBeCloseTo(5, 0);
  });

  it('plays the first two of 8 channels', async () => {
    const tones = Array.from({ length: 8 }, (_, channel) => ['sine', String(1000 * (channel + 1))]).flat();
    const path = await folder.sox('eight.wav', ['-n', '-r', '48000', '-c', '8', '-b', '16'], ['synth', '1', ...tones]);
    const { outputPath } = await transcode(path);
    const { streams } = await describeByFfprobe(outputPath);
    expect(streams).toMatchObject([{ channels: 2 }]);
  });

  it('fails an unfinished MP4 as truncated and leaves no file', async () => {
    const whole = await readFile(await folder.ffmpeg('whole.m4a', ...toneInput(5)));
    const path = await folder.write('cut.m4a', whole.subarray(0, 20_000));
    const outputPath = folder.path('none.mp3');
    const probe = await probeMedia(path);
    await expect(transcodeForPlayback(path, probe, outputPath)).rejects.toMatchObject({ code: 'truncated' });
    await expect(access(outputPath)).rejects.toMatchObject({ code: 'ENOENT' });
  });

  it('leaves no file when it is stopped', async () => {
    const path = await folder.ffmpeg('stop.m4a', ...toneInput(5));
    const outputPath = folder.path('stopped.mp3');
    const stopped = transcodeForPlayback(
      path,
      await probeMedia(path),
      outputPath,
      AbortSignal.abort(new Error('stop')),
    );
    await expect(stopped).rejects.toThrow('stop');
    await expect(access(outputPath)).rejects.toMatchObject({ code: 'ENOENT' });
  });
});
