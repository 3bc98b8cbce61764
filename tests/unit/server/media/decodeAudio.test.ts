import { execFile } from 'node:child_process';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { decodeAudio, type DecodedAudio } from '#server/media/decodeAudio.ts';
import { probeMedia } from '#server/media/probeMedia.ts';
import { createMediaFolder, toneInput, type MediaFolder } from '#tests/fixtures/media/makeMedia.ts';
import { largestDifference, rootMeanSquare, toneHz } from '#tests/fixtures/media/soundFigures.ts';
import { chunkBytes, floatSamples, sine16, wavBytes } from '#tests/fixtures/media/wavBytes.ts';

const run = promisify(execFile);
/** ffmpeg's `sine` has an amplitude of 1/8 (ffmpeg-filters, "sine"). */
const TONE_RMS = 0.125 / Math.SQRT2;

let folder: MediaFolder;
beforeAll(async () => {
  folder = await createMediaFolder();
});
afterAll(() => folder.remove());

async function decode(path: string): Promise<DecodedAudio> {
  return decodeAudio(path, await probeMedia(path));
}

/** The first channel as sox reads it: a decoder that has nothing in common with either of ours. */
async function soxSamples(path: string): Promise<Float32Array> {
  const raw = await run('sox', ['-D', path, '-t', 'f32', '-', 'remix', '1'], {
    encoding: 'buffer',
    maxBuffer: 2 ** 26,
  });
  return new Float32Array(new Uint8Array(raw.stdout).buffer);
}

describe('decodeAudio', () => {
  it.each([
    ['8-bit PCM', 'wav-decoder', ['-b', '8', '-e', 'unsigned-integer'], 1 / 127],
    ['16-bit PCM', 'wav-decoder', ['-b', '16'], 0],
    ['24-bit PCM (extensible)', 'ffmpeg', ['-b', '24'], 0],
    ['32-bit PCM (extensible)', 'ffmpeg', ['-b', '32'], 2 ** -24],
    ['32-bit float (extensible or not)', /^/, ['-b', '32', '-e', 'floating-point'], 0],
    ['64-bit float', 'ffmpeg', ['-b', '64', '-e', 'floating-point'], 2 ** -24],
    ['µ-law', 'ffmpeg', ['-e', 'u-law'], 0],
    ['A-law', 'ffmpeg', ['-e', 'a-law'], 0],
    ['MS ADPCM', 'ffmpeg', ['-e', 'ms-adpcm'], 0.002],
    ['IMA ADPCM', 'ffmpeg', ['-e', 'ima-adpcm'], 0.002],
    ['big-endian RIFX', 'ffmpeg', ['-b', '16', '-B'], 0],
  ])('gives the samples of a WAV of %s as sox reads them, through %s', async (_kind, decoder, encoding, tolerance) => {
    const path = await folder.sox(
      'sox.wav',
      ['-n', '-r', '44100', ...encoding],
      ['synth', '2', 'sine', '300-3000', 'gain', '-3'],
    );
    const decoded = await decode(path);
    const expected = await soxSamples(path);
    expect(decoded).toMatchObject({ sampleRateHz: 44_100, channelPolicy: 'all', warnings: [] });
    expect(decoded.decoder).toMatch(decoder);
    // Decoders of ADPCM round their predictor differently. Eight bits: wav-decoder scales positive values by 127, sox by 128.
    expect(largestDifference(decoded.channels[0] ?? [], expected)).toBeLessThanOrEqual(tolerance);
    expect(decoded.channels[0]?.length).toBe(expected.length);
  });

  it.each([
    ['tone.m4a', ['-c:a', 'aac', '-b:a', '96k']],
    ['tone.mov', ['-c:a', 'pcm_s16be']],
    ['tone.mp4', ['-c:a', 'alac', '-f', 'mp4']],
    ['tone.aac', []],
    ['tone.mp3', []],
    ['tone.webm', ['-c:a', 'libopus']],
    ['tone.ogg', ['-c:a', 'libvorbis']],
    ['tone.opus', ['-c:a', 'libopus']],
    ['tone.flac', []],
    ['tone.caf', []],
    ['tone.aiff', []],
    ['tone.w64', []],
    ['tone.3gp', ['-ar', '8000', '-c:a', 'libopencore_amrnb', '-b:a', '12.2k']],
    ['tone.amr', ['-ar', '8000', '-c:a', 'libopencore_amrnb', '-b:a', '12.2k']],
  ])('hears the 800 Hz and the 3 s of %s without a warning', async (name, encoding) => {
    const decoded = await decode(await folder.ffmpeg(name, ...toneInput(3, 800), ...encoding));
    const [samples = new Float32Array()] = decoded.channels;
    const middle = samples.subarray(decoded.sampleRateHz, 2 * decoded.sampleRateHz);
    expect(decoded).toMatchObject({ decoder: 'ffmpeg', warnings: [] });
    // Crossings within one second of a lossy codec: 0.1 % covers the noise of AMR. Level within 1 dB, but the AMR
    // decoder of ffmpeg renders a pure tone 5 dB too low (libopencore, the reference, 0.5 dB).
    expect(toneHz(middle, decoded.sampleRateHz) / 800).toBeCloseTo(1, 3);
    expect(rootMeanSquare(middle) / TONE_RMS).toBeGreaterThan(decoded.codec === 'amr_nb' ? 0.5 : 0.89);
    expect(rootMeanSquare(middle) / TONE_RMS).toBeLessThan(1.12);
    // Encoders add up to one AAC start block of 2112 frames and fill their last block.
    expect(decoded.durationSeconds).toBeGreaterThanOrEqual(3);
    expect(decoded.durationSeconds).toBeLessThan(3.1);
  });

  it('gives a stereo file both channels, opposite phases as they are', async () => {
    const mono = await folder.sox(
      'mono.wav',
      ['-n', '-r', '44100', '-b', '16'],
      ['synth', '1', 'sine', '300', 'gain', '-3'],
    );
    const path = await folder.sox('opposite.wav', [mono], ['remix', '1v1', '1v-1']);
    const { channels, channelPolicy, sourceChannelCount } = await decode(path);
    expect({ channelPolicy, sourceChannelCount, kept: channels.length }).toEqual({
      channelPolicy: 'all',
      sourceChannelCount: 2,
      kept: 2,
    });
    const [left = new Float32Array(), right = new Float32Array()] = channels;
    // One step of 16 bits: the lowest value has no positive counterpart.
    expect(
      largestDifference(
        left,
        right.map((value) => -value),
      ),
    ).toBeLessThanOrEqual(2 ** -15);
    expect(rootMeanSquare(left)).toBeGreaterThan(0.4);
  });

  it.each(['wav', 'flac'])(
    'keeps the first two of 8 channels of %s, and the first alone at 192 kHz',
    async (format) => {
      for (const [sampleRateHz, channelPolicy, kept] of [
        [48_000, 'first-two', 2],
        [192_000, 'first', 1],
      ] as const) {
        const tones = Array.from({ length: 8 }, (_, channel) => ['sine', String(1000 * (channel + 1))]).flat();
        const source = ['-n', '-r', String(sampleRateHz), '-c', '8', '-b', '16'];
        const path = await folder.sox(`eight.${format}`, source, ['synth', '1', ...tones]);
        const decoded = await decode(path);
        expect(decoded).toMatchObject({ channelPolicy, sourceChannelCount: 8, sampleRateHz, warnings: [] });
        const heard = decoded.channels.map((samples) => Math.round(toneHz(samples, sampleRateHz)));
        expect(heard).toEqual([1000, 2000].slice(0, kept));
      }
    },
  );

  it('decodes the default of two sound tracks', async () => {
    const inputs = [...toneInput(1, 300), ...toneInput(1, 400), '-map', '0', '-map', '1'];
    const path = await folder.ffmpeg(
      'two.mka',
      ...inputs,
      '-c:a',
      'flac',
      '-disposition:0',
      '0',
      '-disposition:1',
      'default',
    );
    const { channels, sampleRateHz } = await decode(path);
    expect(toneHz(channels[0] ?? new Float32Array(), sampleRateHz)).toBeCloseTo(400, 1);
  });

  it('keeps the rates of 8 and of 192 kHz', async () => {
    for (const sampleRateHz of [8000, 192_000]) {
      const path = await folder.ffmpeg('rate.flac', ...toneInput(1, 300, sampleRateHz));
      expect(await decode(path)).toMatchObject({ sampleRateHz, durationSeconds: 1 });
    }
  });

  it('hears both data chunks of a split WAV', async () => {
    const data = sine16({ toneHz: 300, sampleRateHz: 44_100, sampleCount: 44_100 });
    const path = await folder.write('split.wav', wavBytes({ data, afterData: chunkBytes('data', data) }));
    expect(await decode(path)).toMatchObject({ durationSeconds: 2, decoder: 'wav-decoder', warnings: [] });
  });

  it('reads the extremes of 24 bits with their sign', async () => {
    const extremes = Buffer.from('000080ffff7f', 'hex');
    const data = Buffer.concat(Array.from({ length: 12_000 }, () => extremes));
    const path = await folder.write('extremes.wav', wavBytes({ data, bitsPerSample: 24 }));
    const { channels, decoder } = await decode(path);
    expect(decoder).toBe('wav-decoder');
    expect(Array.from(channels[0]?.subarray(0, 2) ?? [])).toEqual([-1, 1 - 2 ** -23]);
  });

  it('reads silence of 8 bits as zeros', async () => {
    const path = await folder.write('quiet.wav', wavBytes({ data: Buffer.alloc(44_100, 0x80), bitsPerSample: 8 }));
    expect((await decode(path)).channels[0]?.every((value) => value === 0)).toBe(true);
  });

  it('passes NaN, infinities, 1e30 and denormals on for the analysis to judge', async () => {
    const odd = [NaN, Infinity, -Infinity, Math.fround(1e30), Math.fround(1e-40)];
    const data = floatSamples([...odd, ...Array.from({ length: 44_100 }, () => 0)]);
    const path = await folder.write('odd.wav', wavBytes({ data, formatTag: 3, bitsPerSample: 32 }));
    const { channels } = await decode(path);
    expect(Array.from(channels[0]?.subarray(0, 5) ?? [])).toEqual(odd);
  });

  it('stops when it is told to', async () => {
    const path = await folder.ffmpeg('stop.m4a', ...toneInput(5));
    const probe = await probeMedia(path);
    await expect(decodeAudio(path, probe, AbortSignal.abort(new Error('lease lost')))).rejects.toThrow('lease lost');
  });
});
