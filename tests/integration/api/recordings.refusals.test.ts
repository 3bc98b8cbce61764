import { once } from 'node:events';
import { beforeAll, describe, expect, it } from 'vitest';
import { MAXIMUM_UPLOAD_BYTES } from '#lib/schemas/uploadLimits.ts';
import type { ErrorCode } from '#server/errors.ts';
import { addMember, createAccount, createBenchWithAccounts, type TestBench } from '#tests/factories/account.ts';
import { wavFile } from '#tests/factories/wavFile.ts';
import { apiClient } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';
import { tracesOf } from '#tests/support/traces.ts';
import {
  answerTo,
  BOUNDARY,
  field,
  filePart,
  FORM_END,
  openUpload,
  part,
  RECORDINGS,
  sendRaw,
  sendUpload,
} from '#tests/support/uploads.ts';

const WAV = wavFile();
const NOTHING = { recordings: 0, events: 0, audits: 0 };
const form = (...parts: Uint8Array[]): Buffer => Buffer.concat([...parts, FORM_END]);

let bench: TestBench;
let foreign: TestBench;

beforeAll(async () => {
  [bench, foreign] = await Promise.all([createBenchWithAccounts(), createBenchWithAccounts()]);
});

/** Every refusal here comes before the acknowledgement: no row, no event, no audit line. */
const expectNothingKept = async (): Promise<void> => {
  expect(await tracesOf(bench.benchId)).toEqual(NOTHING);
};

describe('POST /api/v1/recordings, who may', () => {
  it('refuses nobody with 401, a foreign bench with 404, a viewer and a read token with 403', async () => {
    const nobody = await apiClient().send(RECORDINGS, { method: 'POST', body: new FormData() });
    expectProblem(nobody, 'not-signed-in');
    const toForeign = await sendUpload(bench.member, { bytes: WAV, fields: { benchId: foreign.benchId } });
    expectProblem(toForeign, 'not-found');
    expectProblem(await sendUpload(bench.viewer, { bytes: WAV }), 'forbidden');
    const reader = await createAccount({ access: 'read' });
    await addMember(bench.benchId, reader, 'owner');
    expectProblem(await sendUpload(reader, { bytes: WAV }), 'forbidden');
    await expectNothingKept();
  });

  it('asks for the bench when there are several, before and after the file', async () => {
    const both = await createAccount();
    await addMember(bench.benchId, both, 'member');
    await addMember(foreign.benchId, both, 'viewer');
    expectProblem(await sendUpload(both, { bytes: WAV }), 'invalid-fields', ['benchId']);
    expectProblem(await sendUpload(both, { bytes: WAV, fields: { benchId: foreign.benchId } }), 'forbidden');
    const late = form(filePart(WAV), field('benchId', foreign.benchId));
    expectProblem(await sendRaw(both, { body: late }), 'forbidden');
    await expectNothingKept();
  });

  it.each(['sessions', 'builds'])('says the same of foreign and unknown %s', async (what) => {
    const geometry = { poles: 2, segments: 3, blades: null, teeth: null, magnets: null };
    const isBuild = what === 'builds';
    const body = isBuild ? { name: 'Red can', geometry } : { title: 'Tuesday', purpose: 'speed-check' };
    const created = await apiClient(foreign.owner).post(`/api/v1/${what}`, body);
    expect(created.status, created.text).toBe(201);
    const name = isBuild ? 'buildId' : 'sessionId';
    const { id } = created.body as { id: string };
    const ofForeign = await sendUpload(bench.member, { bytes: WAV, fields: { [name]: id } });
    const ofNobody = await sendUpload(bench.member, { bytes: WAV, fields: { [name]: bench.benchId } });
    expectProblem(ofForeign, 'invalid-fields', [name]);
    const withoutRequestId = (answer: { body: unknown }) => ({ ...(answer.body as object), requestId: '' });
    expect(withoutRequestId(ofForeign)).toEqual(withoutRequestId(ofNobody));
    await expectNothingKept();
  });
});

describe('POST /api/v1/recordings, files that are none', () => {
  const riffWithoutSound = Buffer.from('RIFF\x24\0\0\0WAVE', 'latin1');
  const html = Buffer.from('<html><script>alert(1)</script></html>');
  const playlist = Buffer.from('#EXTM3U\n#EXTINF:1,\nfile:///etc/passwd\n');
  const cases: readonly [string, Uint8Array, ErrorCode, RegExp][] = [
    ['of 0 bytes', new Uint8Array(0), 'empty-file', /^The file is empty \(0 bytes\)\./],
    ['that stops after the first header', riffWithoutSound, 'no-audio', /sound/],
    ['of 0 samples', wavFile({ durationSeconds: 0 }), 'too-short', /0\.0 s; at least 0\.5 s needed/],
    ['of 0.2 s', wavFile({ durationSeconds: 0.2 }), 'too-short', /0\.2 s; at least 0\.5 s needed/],
    ['of HTML', html, 'not-audio', /not a sound or video recording/],
    [
      'that is an empty ZIP',
      Buffer.from('PK\x05\x06'.padEnd(22, '\0'), 'latin1'),
      'unsupported-media-type',
      /ZIP archive/,
    ],
    ['that lists other files', playlist, 'not-audio', /not a sound or video recording/],
  ];

  it.each(cases)('refuses a file %s', async (_, bytes, code, words) => {
    const answer = await sendUpload(bench.member, { bytes: new Uint8Array(bytes) });
    expectProblem(answer, code);
    expect((answer.body as { detail: string }).detail).toMatch(words);
    await expectNothingKept();
  });
});

describe('POST /api/v1/recordings, fields', () => {
  const RANGES = { eventsPerTurn: /above 0 and at most 1000/, supplyVolts: /from 0 to 1000 V/ };
  const numbers = ['NaN', '1e309', '-0', '1e5', '١٢', '-1', '0x10', 'Infinity', '1 000', '6;3'];
  it.each(numbers)('refuses %s where a number goes, with the range', async (text) => {
    for (const [name, range] of Object.entries(RANGES)) {
      const answer = await sendUpload(bench.member, { bytes: WAV, fields: { [name]: text } });
      expectProblem(answer, 'invalid-fields', [name]);
      expect(answer.text).toMatch(range);
    }
    await expectNothingKept();
  });

  it.each(['id', 'ownerId', 'role', 'state', 'reading', 'createdAt', '__proto__', 'constructor'])(
    'refuses to be told %s',
    async (name) => {
      const answer = await sendRaw(bench.member, { body: form(field(name, 'x'), filePart(WAV)) });
      expectProblem(answer, 'invalid-fields', [name]);
      await expectNothingKept();
    },
  );

  const nested = '['.repeat(10_000);
  const cases: readonly [string, string, Uint8Array][] = [
    ['a note of 1 MB', 'note', field('note', 'x'.repeat(1_000_000))],
    ['a note of 2001 characters', 'note', field('note', 'x'.repeat(2001))],
    ['a lone surrogate in a note', 'note', part('; name="note"', Buffer.from([0x61, 0xed, 0xa0, 0x80]))],
    ['a note that is given twice', 'note', Buffer.concat([field('note', 'a'), field('note', 'b')])],
    ['orders nested 10,000 deep', 'orders', field('orders', nested)],
    ['an identifier that is a statement', 'sessionId', field('sessionId', '1 OR 1=1')],
    ['an identifier that is a list', 'sessionId', field('sessionId[]', 'x')],
    ['a range upside down', 'rpmMax', Buffer.concat([field('rpmMin', '500'), field('rpmMax', '400')])],
  ];
  it.each(cases)('names the field of %s, before and after the file', async (_, name, given) => {
    for (const body of [form(given, filePart(WAV)), form(filePart(WAV), given)]) {
      const answer = await sendRaw(bench.member, { body });
      expect(answer.status, answer.text).toBe(422);
      expect(answer.text).toContain(`"field":"${name}`);
    }
    await expectNothingKept();
  });
});

describe('POST /api/v1/recordings, forms', () => {
  const plainType = { 'content-type': 'multipart/form-data' };
  const longHeader = part(`; name="file"; filename="${'x'.repeat(100_000)}"`, WAV);
  const manyParts = Array.from({ length: 10_000 }, (_, index) => field(`field${String(index)}`, 'x'));
  const cases: readonly [string, ErrorCode, Parameters<typeof sendRaw>[1]][] = [
    ['without a boundary', 'bad-request', { body: form(filePart(WAV)), headers: plainType }],
    [
      'with another boundary',
      'bad-request',
      { body: form(filePart(WAV)), headers: { 'content-type': 'multipart/form-data; boundary=other' } },
    ],
    ['with two files', 'bad-request', { body: form(filePart(WAV), filePart(WAV)) }],
    ['with a file of another name', 'bad-request', { body: form(part('; name="clip"; filename="a.wav"', WAV)) }],
    ['with 10,000 parts', 'bad-request', { body: form(...manyParts) }],
    ['with a part header of 100 kB', 'bad-request', { body: form(longHeader) }],
    ['without its end', 'bad-request', { body: filePart(WAV) }],
    ['without a file', 'invalid-fields', { body: form(field('note', 'alone')) }],
    ['with a NUL in the name', 'invalid-fields', { body: form(filePart(WAV, 'a\0b.wav')) }],
    [
      'with an escaped NUL in the name',
      'invalid-fields',
      { body: form(part('; name="file"; filename*=utf-8\'\'a%00b.wav', WAV)) },
    ],
    [
      'that is compressed',
      'unsupported-media-type',
      { body: form(filePart(WAV)), headers: { 'content-encoding': 'gzip' } },
    ],
    [
      'that is JSON',
      'unsupported-media-type',
      { body: Buffer.from('{}'), headers: { 'content-type': 'application/json' } },
    ],
    ['without a type', 'unsupported-media-type', { body: form(filePart(WAV)), headers: { 'content-type': '' } }],
    [
      'with a key of 129 characters',
      'invalid-fields',
      { body: form(filePart(WAV)), headers: { 'idempotency-key': 'k'.repeat(129) } },
    ],
  ];
  it.each(cases)('refuses a form %s', async (_, code, raw) => {
    expectProblem(await sendRaw(bench.member, raw), code);
    await expectNothingKept();
  });

  it('refuses a declared length over the limit before a byte has come', async () => {
    const sent = openUpload(bench.member, { 'content-length': MAXIMUM_UPLOAD_BYTES * 2 });
    sent.flushHeaders();
    expectProblem(await answerTo(sent), 'too-large');
    sent.destroy();
    await expectNothingKept();
  });

  it('refuses a file one byte over the limit, and one of unknown length at the limit', async () => {
    const start = `--${BOUNDARY}\r\nContent-Disposition: form-data; name="file"; filename="a.wav"\r\n\r\n`;
    const sent = openUpload(bench.member, { 'transfer-encoding': 'chunked' });
    const answer = answerTo(sent);
    const block = Buffer.alloc(1_000_000);
    const progress = { isAnswered: false };
    let sentBytes = 0;
    void answer.then(() => (progress.isAnswered = true));
    sent.write(start);
    while (!progress.isAnswered && sentBytes < 2 * MAXIMUM_UPLOAD_BYTES) {
      sentBytes += block.length;
      if (!sent.write(block)) await Promise.race([once(sent, 'drain'), answer]);
    }
    expectProblem(await answer, 'too-large');
    sent.destroy();
    // What lies in sockets and pipes between the two.
    expect(sentBytes).toBeLessThan(MAXIMUM_UPLOAD_BYTES * 1.3);
    const exact = form(filePart(new Uint8Array(MAXIMUM_UPLOAD_BYTES + 1)));
    expectProblem(await sendRaw(bench.member, { body: exact }), 'too-large');
    await expectNothingKept();
  });
});
