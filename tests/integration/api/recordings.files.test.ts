import { request } from 'node:http';
import { setTimeout as pause } from 'node:timers/promises';
import { beforeAll, describe, expect, it } from 'vitest';
import { createBenchWithAccounts, type TestBench } from '#tests/factories/account.ts';
import { wavFile } from '#tests/factories/wavFile.ts';
import { apiClient, baseUrl } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';
import { RECORDINGS, upload } from '#tests/support/uploads.ts';

const SOUND = wavFile({ durationSeconds: 2, seed: 500 });
/** A recording that is a script as well: the sound ends where the chunk says, the rest is for a browser to fall for. */
const POLYGLOT = new Uint8Array([...SOUND, ...Buffer.from('<script>alert(document.domain)</script>')]);
const NAME = 'Lüfter "5" <b>;\u2028 100%.html';

let bench: TestBench;
let id: string;

beforeAll(async () => {
  bench = await createBenchWithAccounts();
  id = (await upload(bench.member, { bytes: POLYGLOT, fileName: NAME })).id;
});

/** Bytes as they are; the JSON client would read them as text. */
async function fetchBytes(path: string, headers: Record<string, string> = {}) {
  const authorization = `Bearer ${bench.viewer.token}`;
  const response = await fetch(`${baseUrl()}${RECORDINGS}/${path}`, { headers: { authorization, ...headers } });
  return { response, bytes: new Uint8Array(await response.arrayBuffer()) };
}

describe('GET /api/v1/recordings/[id]/original', () => {
  it('gives the bytes that were uploaded, to save and never to show', async () => {
    const { response, bytes } = await fetchBytes(`${id}/original`);
    expect(response.status).toBe(200);
    expect(Buffer.compare(bytes, POLYGLOT)).toBe(0);
    expect(response.headers.get('content-type')).toBe('application/octet-stream');
    expect(response.headers.get('x-content-type-options')).toBe('nosniff');
    expect(response.headers.get('content-security-policy')).toMatch(/default-src 'none'.*sandbox/);
    const disposition = response.headers.get('content-disposition') ?? '';
    expect(disposition).toMatch(/^attachment; filename="[^"\\\x7f-\uffff]*"; filename\*=UTF-8''[\w!#$&+\-.^`|~%]+$/);
    expect(decodeURIComponent(disposition.split("''")[1] ?? '')).toBe('Lüfter "5" <b>; 100%.html');
  });

  it.each([
    ['bytes=0-3', 206, 'bytes 0-3', 'RIFF'],
    ['bytes=8-11', 206, 'bytes 8-11', 'WAVE'],
    ['bytes=-9', 206, undefined, '</script>'],
  ])('answers %s with %d and that stretch', async (range, status, contentRange, text) => {
    const { response, bytes } = await fetchBytes(`${id}/original`, { range });
    expect(response.status).toBe(status);
    expect(Buffer.from(bytes).toString()).toBe(text);
    if (contentRange) expect(response.headers.get('content-range')).toBe(`${contentRange}/${String(POLYGLOT.length)}`);
  });

  it('answers a range beyond the end with 416, and what is no range as a whole', async () => {
    const beyond = await fetchBytes(`${id}/original`, { range: `bytes=${String(POLYGLOT.length)}-` });
    expect(beyond.response.status).toBe(416);
    expect(beyond.response.headers.get('content-range')).toBe(`bytes */${String(POLYGLOT.length)}`);
    for (const range of ['lines=1-2', 'bytes=5-2', 'bytes=0-1,4-5', 'bytes=-']) {
      expect((await fetchBytes(`${id}/original`, { range })).response.status).toBe(200);
    }
  });

  it('answers HEAD with the length alone', async () => {
    const answer = await apiClient(bench.viewer).send(`${RECORDINGS}/${id}/original`, { method: 'HEAD' });
    expect(answer.headers.get('content-length')).toBe(String(POLYGLOT.length));
    expect(answer.text).toBe('');
  });

  it('reads no more from the disk than a slow reader takes, and goes on when the reader does', async () => {
    const large = silence(100_000_000);
    const big = await upload(bench.member, { bytes: large });
    const memory = await webMemoryBytes();
    const headers = { authorization: `Bearer ${bench.viewer.token}` };
    const sent = request(`${baseUrl()}${RECORDINGS}/${big.id}/original`, { headers, agent: false }).end();
    let receivedBytes = 0;
    const done = new Promise<void>((resolve, reject) => {
      sent.on('error', reject).on('response', (response) => {
        response.pause();
        response.on('data', (chunk: Buffer) => (receivedBytes += chunk.length)).on('end', resolve);
        void pause(1000).then(async () => {
          // Of 100 MB a few blocks and the sockets' own buffers, not the file.
          expect((await webMemoryBytes()) - memory).toBeLessThan(32_000_000);
          response.resume();
        }, reject);
      });
    });
    await done;
    expect(receivedBytes).toBe(large.length);
  });
});

describe('POST /api/v1/recordings of 195 MB', () => {
  it('adds less than 64 MB to the web server', async () => {
    const before = await webMemoryBytes();
    let worst = 0;
    const timer = setInterval(() => {
      void webMemoryBytes().then((bytes) => (worst = Math.max(worst, bytes - before)));
    }, 50);
    await upload(bench.member, { bytes: silence(195_000_000) });
    clearInterval(timer);
    expect(worst).toBeLessThan(64_000_000);
  });
});

/** A WAV of zeros at 192 kHz. */
function silence(byteCount: number): Uint8Array<ArrayBuffer> {
  const bytes = new Uint8Array(byteCount);
  bytes.set(wavFile({ durationSeconds: 0 }));
  const header = new DataView(bytes.buffer);
  header.setUint32(4, byteCount - 8, true);
  header.setUint32(24, 192_000, true);
  header.setUint32(28, 384_000, true);
  header.setUint32(40, byteCount - 44, true);
  return bytes;
}

/** Resident memory of the web server, from its metrics. */
async function webMemoryBytes(): Promise<number> {
  const text = await (await fetch(`${baseUrl()}/metrics`)).text();
  return Number(/^ripplebench_process_resident_memory_bytes (\S+)$/m.exec(text)?.[1] ?? Number.NaN);
}

describe('GET /api/v1/recordings/[id]/playback', () => {
  it('gives sound that was made anew, in ranges, with nothing of the original in it', async () => {
    const { response, bytes } = await fetchBytes(`${id}/playback`);
    expect(response.status).toBe(200);
    expect(response.headers.get('content-type')).toBe('audio/mpeg');
    // 2 s at 128 kbit/s are 32 kB; a frame more or less.
    expect(Math.abs(bytes.length - 32_000)).toBeLessThan(2000);
    expect(Buffer.from(bytes).includes('<script>')).toBe(false);
    const part = await fetchBytes(`${id}/playback`, { range: 'bytes=100-199' });
    expect(part.response.status).toBe(206);
    expect(Buffer.compare(part.bytes, bytes.subarray(100, 200))).toBe(0);
  });

  it('is made once for all who ask at the same time', async () => {
    const other = await upload(bench.member, { bytes: wavFile({ durationSeconds: 2, seed: 502 }) });
    const answers = await Promise.all(Array.from({ length: 5 }, () => fetchBytes(`${other.id}/playback`)));
    const [first] = answers;
    for (const { response, bytes } of answers) {
      expect(response.status).toBe(200);
      expect(Buffer.compare(bytes, first?.bytes ?? new Uint8Array())).toBe(0);
    }
  });

  it('refuses a file in which nothing can be heard with its reason', async () => {
    const unfinished = Buffer.concat([
      Buffer.from('\0\0\0\x18ftypmp42\0\0\0\0mp42isom', 'latin1'),
      Buffer.from('\0\x01\0\0mdat', 'latin1'),
      Buffer.alloc(40_000, 7),
    ]);
    const { id: broken } = await upload(bench.member, { bytes: new Uint8Array(unfinished), fileName: 'cut.m4a' });
    expectProblem(await apiClient(bench.viewer).get(`${RECORDINGS}/${broken}/playback`), 'truncated');
  });
});
