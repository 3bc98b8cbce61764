import { execFile } from 'node:child_process';
import { open, readFile } from 'node:fs/promises';
import { createServer, type AddressInfo, type Server } from 'node:net';
import { promisify } from 'node:util';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { decodeAudio } from '#server/media/decodeAudio.ts';
import { COMMON_ARGUMENTS } from '#server/media/ffmpegArguments.ts';
import { probeMedia } from '#server/media/probeMedia.ts';
import { runSandboxed } from '#server/media/runSandboxed.ts';
import { peakMemoryOf } from '#tests/fixtures/media/descendants.ts';
import { hugePng, id3WithPicture, playlists } from '#tests/fixtures/media/hostileBytes.ts';
import { createMediaFolder, pictureInput, toneInput, type MediaFolder } from '#tests/fixtures/media/makeMedia.ts';
import { sine16, wavBytes } from '#tests/fixtures/media/wavBytes.ts';

const run = promisify(execFile);
/** Resident memory that examining or decoding a file of any picture size may take (quality.md, rows 29 and 43). */
const MEMORY_CEILING_BYTES = 150 * 1024 ** 2;

let folder: MediaFolder;
let server: Server;
let connectionCount = 0;

beforeAll(async () => {
  folder = await createMediaFolder();
  server = createServer((socket) => {
    connectionCount++;
    socket.destroy();
  });
  await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
});
beforeEach(() => {
  connectionCount = 0;
});
afterAll(async () => {
  server.close();
  await folder.remove();
});

/** Bytes that ffmpeg makes of a file behind our lists, without our own look at its first bytes. */
async function decodedByToolAlone(inputPath: string, mode: 'bubblewrap' | 'prlimit'): Promise<number> {
  let byteCount = 0;
  const result = await runSandboxed({
    program: 'ffmpeg',
    programArguments: (input) => ['-nostdin', ...COMMON_ARGUMENTS, '-i', input, '-f', 'f32le', 'pipe:1'],
    inputPath,
    wallSeconds: 10,
    maximumOutputBytes: 10_000_000,
    onOutput: (bytes) => {
      byteCount += bytes.length;
    },
    mode,
  });
  expect(result.exitStatus).not.toBe(0);
  return byteCount;
}

/** A pipe with a name tells whether anybody opens it for reading: only then does opening it for writing return. */
async function watchOpening(path: string): Promise<{ wasOpened: () => boolean; stop: () => Promise<void> }> {
  await run('mkfifo', [path]);
  let isOpened = false;
  const writer = open(path, 'w').then((file) => {
    isOpened = true;
    return file;
  });
  return {
    wasOpened: () => isOpened,
    stop: async () => {
      const reader = await open(path, 'r');
      await (await writer).close();
      await reader.close();
    },
  };
}

describe('probeMedia on files that pretend to be recordings', () => {
  it.each(Object.keys(playlists('')))('refuses a %s as not-audio and opens nothing that it names', async (kind) => {
    const foreignPath = folder.path(`foreign-${kind.replaceAll(' ', '-')}.wav`);
    const foreign = await watchOpening(foreignPath);
    try {
      for (const target of [foreignPath, `file://${foreignPath}`]) {
        const path = await folder.write('disguise.m4a', playlists(target)[kind] ?? '');
        await expect(probeMedia(path)).rejects.toMatchObject({ name: 'MediaRefused', code: 'not-audio' });
        expect(await decodedByToolAlone(path, 'prlimit')).toBe(0);
        expect(await decodedByToolAlone(path, 'bubblewrap')).toBe(0);
      }
      expect(foreign.wasOpened()).toBe(false);
    } finally {
      await foreign.stop();
    }
  });

  it.each(Object.keys(playlists('')))('refuses a %s that names an address and connects to nothing', async (kind) => {
    const { port } = server.address() as AddressInfo;
    for (const target of [
      `http://127.0.0.1:${port}/a.ts`,
      `tcp://127.0.0.1:${port}`,
      'http://169.254.169.254/latest',
    ]) {
      const path = await folder.write('disguise.wav', playlists(target)[kind] ?? '');
      await expect(probeMedia(path)).rejects.toMatchObject({ code: 'not-audio' });
      expect(await decodedByToolAlone(path, 'prlimit')).toBe(0);
    }
    expect(connectionCount).toBe(0);
  });

  it('is tested with a playlist that does work: ffmpeg without our lists decodes what it names', async () => {
    const foreign = await folder.ffmpeg('foreign.mp3', ...toneInput(1));
    const path = await folder.write('disguise.m4a', playlists(foreign)['HLS playlist'] ?? '');
    const { stdout } = await run('ffmpeg', ['-v', 'error', '-i', path, '-f', 'f32le', 'pipe:1'], {
      encoding: 'buffer',
      maxBuffer: 10_000_000,
    });
    expect(stdout.length).toBeGreaterThan(100_000);
  });

  it.each([
    ['an SVG', '<svg xmlns="http://www.w3.org/2000/svg" onload="alert(1)"/>'],
    ['an HTML page', '<!doctype html><script>alert(1)</script>'],
    ['a PNG', hugePng(16)],
    ['an AVI', Buffer.from('RIFF\x24\0\0\0AVI LIST', 'latin1')],
    ['one byte', Buffer.from('R')],
  ])('refuses %s as not-audio', async (_kind, bytes) => {
    const path = await folder.write('disguise.mp4', bytes);
    await expect(probeMedia(path)).rejects.toMatchObject({ code: 'not-audio' });
  });

  it.each([
    ['a ZIP', 'PK\x03\x04'],
    ['an empty ZIP', 'PK\x05\x06'],
  ])('says that %s is to be unpacked first', async (_kind, magic) => {
    const path = await folder.write('evening.wav', Buffer.concat([Buffer.from(magic, 'latin1'), Buffer.alloc(1000)]));
    await expect(probeMedia(path)).rejects.toMatchObject({
      code: 'unsupported-media-type',
      message: expect.stringContaining('ZIP archive') as string,
    });
  });

  it('accepts a WAV with a script behind it and hears only the sound', async () => {
    const data = sine16({ toneHz: 300, sampleRateHz: 44_100, sampleCount: 44_100 });
    const path = await folder.write(
      'both.wav',
      wavBytes({ data, afterData: Buffer.from('<script>alert(1)</script>') }),
    );
    const { channels, warnings } = await decodeAudio(path, await probeMedia(path));
    expect([channels[0]?.length, warnings]).toEqual([44_100, []]);
  });

  it('never says a path or the words of a tool', async () => {
    const damaged = await folder.write('upload-17.flac', Buffer.concat([Buffer.from('fLaC'), Buffer.alloc(2000, 7)]));
    const error: unknown = await probeMedia(damaged).catch((caught: unknown) => caught);
    expect(String(error)).toMatch(/^MediaRefused: /);
    expect(String(error)).not.toMatch(/ffmpeg|ffprobe|flac|upload|\/|0x/);
  });

  it('reads the sound of an 8K video in less than 150 MB', async () => {
    const inputs = [...pictureInput(2, '7680x4320'), ...toneInput(2)];
    const path = await folder.ffmpeg('8k.mp4', ...inputs, '-c:v', 'libx264', '-preset', 'ultrafast', '-r', '2');
    const peakBytes = await peakMemoryOf(path, async () => {
      const decoded = await decodeAudio(path, await probeMedia(path));
      expect(decoded.warnings).toEqual([]);
    });
    expect(peakBytes).toBeGreaterThan(0);
    expect(peakBytes).toBeLessThan(MEMORY_CEILING_BYTES);
  });

  it.each([
    ['of 50 MB', Buffer.alloc(50_000_000, 1)],
    ['of 20000² pixels', hugePng(20_000)],
  ])('reads an MP3 with a cover picture %s without decoding the picture', async (_size, picture) => {
    const mp3 = await readFile(await folder.ffmpeg('tone.mp3', ...toneInput(2), '-id3v2_version', '0'));
    const path = await folder.write('cover.mp3', Buffer.concat([id3WithPicture(picture), mp3]));
    const peakBytes = await peakMemoryOf(path, async () => {
      const probe = await probeMedia(path);
      expect(probe).toMatchObject({ container: 'mp3', hasVideo: false });
      expect((await decodeAudio(path, probe)).durationSeconds).toBeCloseTo(2, 1);
    });
    expect(peakBytes).toBeLessThan(MEMORY_CEILING_BYTES + picture.length);
  });
});
