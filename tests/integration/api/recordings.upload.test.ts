import { createHash } from 'node:crypto';
import { beforeAll, describe, expect, it } from 'vitest';
import { uploadResponse } from '#lib/schemas/recording.ts';
import { Account } from '#server/models/Account.ts';
import { ApiToken } from '#server/models/ApiToken.ts';
import { AuthSession } from '#server/models/AuthSession.ts';
import { Membership } from '#server/models/Membership.ts';
import { Recording } from '#server/models/Recording.ts';
import { createBenchWithAccounts, type TestBench } from '#tests/factories/account.ts';
import { wavFile } from '#tests/factories/wavFile.ts';
import { apiClient, baseUrl, signInCookie } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';
import { blobIds, expectNoTemporarySince, temporaryNames, tracesOf } from '#tests/support/traces.ts';
import {
  answerTo,
  field,
  filePart,
  FORM_END,
  openUpload,
  part,
  RECORDINGS,
  sendRaw,
  sendUpload,
  upload,
} from '#tests/support/uploads.ts';

let bench: TestBench;

beforeAll(async () => {
  bench = await createBenchWithAccounts();
});

const loadRow = (id: string) => Recording.findOne({ where: { id, benchId: bench.benchId }, rejectOnEmpty: true });

describe('POST /api/v1/recordings', () => {
  it('answers 201 with the SHA-256 of the bytes when row and file are safe', async () => {
    const before = await temporaryNames();
    const bytes = wavFile({ seed: 100 });
    const answer = await sendUpload(bench.member, { bytes, fileName: 'Lüfter 3 V.wav' });
    expect(answer.status, answer.text).toBe(201);
    const [recording] = uploadResponse.parse(answer.body).recordings;
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    expect(recording).toMatchObject({ fileName: 'Lüfter 3 V.wav', sha256, status: 'queued', duplicateOf: null });
    expect(answer.headers.get('location')).toBe(`${RECORDINGS}/${String(recording?.id)}`);
    const row = await loadRow(recording?.id ?? '');
    expect(row.sha256.toString('hex')).toBe(sha256);
    expect(await blobIds()).toContain(row.blobId);
    expect(await tracesOf(bench.benchId)).toMatchObject({ recordings: 1, audits: 1 });
    await expectNoTemporarySince(before);
  });

  it('reads decimals with point or comma, orders with commas or in JSON, and empty as not given', async () => {
    const fields = { eventsPerTurn: '2,5', orders: '2.5, 5', rpmMin: '', supplyVolts: '4.5', note: 'Zeile 1\nZeile 2' };
    const { id } = await upload(bench.member, { bytes: wavFile({ seed: 101 }), fields });
    expect(await loadRow(id)).toMatchObject({
      eventsPerTurn: 2.5,
      orders: [2.5, 5],
      minimumRpm: null,
      supplyVolts: 4.5,
    });
    const other = await upload(bench.member, { bytes: wavFile({ seed: 102 }), fields: { orders: '[6, 12]' } });
    expect((await loadRow(other.id)).orders).toEqual([6, 12]);
  });

  it('reads fields that follow the file', async () => {
    const body = Buffer.concat([filePart(wavFile({ seed: 103 })), field('eventsPerTurn', '7'), FORM_END]);
    const answer = await sendRaw(bench.member, { body });
    const [recording] = uploadResponse.parse(answer.body).recordings;
    expect((await loadRow(recording?.id ?? '')).eventsPerTurn).toBe(7);
  });

  it('takes the build of the session when none is named', async () => {
    const owner = apiClient(bench.owner);
    const geometry = { poles: 2, segments: 3, blades: null, teeth: null, magnets: null };
    const build = (await owner.post('/api/v1/builds', { name: 'Red can', geometry })).body as { id: string };
    const session = { title: 'Tuesday', purpose: 'speed-check', buildId: build.id };
    const { id: sessionId } = (await owner.post('/api/v1/sessions', session)).body as { id: string };
    const { id } = await upload(bench.member, { bytes: wavFile({ seed: 104 }), fields: { sessionId } });
    expect(await loadRow(id)).toMatchObject({ sessionId, buildId: build.id, buildRevision: 1 });
  });

  const names: readonly [string, string][] = [
    ['../../etc/cron.d/x', 'x'],
    ['C:\\a\\b.wav', 'b.wav'],
    ['<img src=x onerror=alert(1)>.wav', '<img src=x onerror=alert(1)>.wav'],
    ['a%0D%0AX-Evil: y.wav', 'aX-Evil: y.wav'],
    ['a\u202Evaw.exe', 'avaw.exe'],
    ['🌀 café.wav', '🌀 café.wav'],
    ['%00.wav', '%00.wav'],
    ['', 'unnamed'],
    ['.', 'unnamed'],
    ['..', 'unnamed'],
    ['-i', '-i'],
    [`${'x'.repeat(5000)}.wav`, `${'x'.repeat(250)}….wav`],
  ];
  it.each(names)('shows the name %j as %j', async (given, shown) => {
    const disposition = `; name="file"; filename="${given.replaceAll('"', '%22')}"`;
    const body = Buffer.concat([part(disposition, wavFile({ seed: 105 }), 'audio/wav'), FORM_END]);
    const [recording] = uploadResponse.parse((await sendRaw(bench.member, { body })).body).recordings;
    expect(recording?.fileName).toBe(shown);
  });

  it('tells a duplicate and keeps it, also of two that come at once', async () => {
    const bytes = wavFile({ seed: 106 });
    const first = await upload(bench.member, { bytes });
    const second = await upload(bench.owner, { bytes, fileName: 'again.wav' });
    expect(first.duplicateOf).toBeNull();
    expect(second.duplicateOf).toBe(first.id);
    const twins = { bytes: wavFile({ seed: 107 }) };
    const both = await Promise.all([upload(bench.member, twins), upload(bench.member, twins)]);
    expect(both.map(({ duplicateOf }) => duplicateOf === null).sort()).toEqual([false, true]);
  });

  it('does not tell of the same bytes in another bench', async () => {
    const bytes = wavFile({ seed: 108 });
    const stranger = await createBenchWithAccounts();
    await upload(stranger.owner, { bytes });
    expect((await upload(bench.member, { bytes })).duplicateOf).toBeNull();
  });
});

describe('POST /api/v1/recordings with an Idempotency-Key', () => {
  it('answers the same key and bytes with 200 and the same body, other bytes with 422', async () => {
    const bytes = wavFile({ seed: 110 });
    const first = await sendUpload(bench.member, { bytes, key: 'Schlüssel' });
    const again = await sendUpload(bench.member, { bytes, key: 'Schlüssel' });
    expect([first.status, again.status]).toEqual([201, 200]);
    expect(again.body).toEqual(first.body);
    const other = await sendUpload(bench.member, { bytes: wavFile({ seed: 111 }), key: 'Schlüssel' });
    expectProblem(other, 'key-reused');
  });

  it('keeps keys apart that the default collation takes for one', async () => {
    const keys = ['Ä', 'A', 'a', 'a '.trim() + '.'];
    const ids = new Set<string>();
    for (const key of keys) ids.add((await upload(bench.member, { bytes: wavFile({ seed: 112 }), key })).id);
    expect(ids.size).toBe(keys.length);
  });

  it('makes one row and one file of 50 uploads at once, from two accounts', async () => {
    const crowd = await createBenchWithAccounts();
    const blobsBefore = await blobIds();
    const bytes = wavFile({ seed: 113 });
    const answers = await Promise.all(
      Array.from({ length: 50 }, (_, index) =>
        sendUpload(index % 2 === 0 ? crowd.member : crowd.owner, { bytes, key: 'crowd' }),
      ),
    );
    expect(answers.map(({ status }) => status).sort()).toEqual([...Array<number>(49).fill(200), 201]);
    expect(new Set(answers.map(({ text }) => text)).size).toBe(1);
    expect(await tracesOf(crowd.benchId)).toMatchObject({ recordings: 1, audits: 1 });
    const { blobId } = await Recording.findOne({ where: { benchId: crowd.benchId }, rejectOnEmpty: true });
    const newBlobs = [...(await blobIds())].filter((id) => !blobsBefore.has(id));
    // Other tests may upload meanwhile, but none of the 49 may have left a file without a row.
    const named = await Recording.count({ where: { benchId: [crowd.benchId], blobId: newBlobs } });
    expect(named).toBe(1);
    expect(newBlobs).toContain(blobId);
  });
});

describe('POST /api/v1/recordings, cut short', () => {
  const body = Buffer.concat([filePart(wavFile({ durationSeconds: 4, seed: 120 })), FORM_END]);

  it.each([0, 0.5, 0.99])(
    'keeps nothing of an upload cut at %d of its bytes, and takes the retry',
    async (fraction) => {
      const [before, cut] = [await temporaryNames(), await createBenchWithAccounts()];
      const key = `cut at ${String(fraction)}`;
      const headers = { 'content-length': body.length, 'idempotency-key': key };
      const sent = openUpload(cut.member, headers);
      sent.on('error', () => undefined);
      sent.write(body.subarray(0, Math.floor(fraction * body.length)));
      await new Promise((resolve) => setTimeout(resolve, 100));
      sent.destroy();
      await expectNoTemporarySince(before);
      expect(await tracesOf(cut.benchId)).toEqual({ recordings: 0, events: 0, audits: 0 });
      for (const status of [201, 200]) expect((await sendRaw(cut.member, { body, headers })).status).toBe(status);
    },
  );
});

describe('POST /api/v1/recordings, rights that end meanwhile', () => {
  /** Sends all but the end of a file, lets `meanwhile` happen, and sends the rest. */
  async function uploadAround(credentials: Record<string, string>, meanwhile: () => Promise<unknown>) {
    const before = await temporaryNames();
    const body = Buffer.concat([filePart(wavFile({ seed: 130 })), FORM_END]);
    const sent = openUpload({ token: '' }, { 'content-length': body.length, ...credentials });
    if (credentials.authorization === undefined) sent.removeHeader('authorization');
    const answer = answerTo(sent);
    sent.write(body.subarray(0, body.length - 100));
    const isNew = (name: string) => !before.includes(name);
    await expect.poll(async () => (await temporaryNames()).some(isNew)).toBe(true);
    await meanwhile();
    sent.end(body.subarray(-100));
    return answer;
  }

  const cases: readonly [string, (bench: TestBench) => Promise<unknown>][] = [
    ['the membership', ({ benchId, member }) => Membership.destroy({ where: { benchId, accountId: member.id } })],
    [
      'the role of a member',
      ({ benchId, member }) => Membership.update({ role: 'viewer' }, { where: { benchId, accountId: member.id } }),
    ],
    ['the account', ({ member }) => Account.update({ disabledAt: new Date() }, { where: { id: member.id } })],
    ['the token', ({ member }) => ApiToken.update({ revokedAt: new Date() }, { where: { accountId: member.id } })],
  ];
  it.each(cases)('refuses with 403 when %s was taken', async (_, take) => {
    const [before, left] = [await temporaryNames(), await createBenchWithAccounts()];
    const answer = await uploadAround({ authorization: `Bearer ${left.member.token}` }, () => take(left));
    expectProblem(answer, 'forbidden');
    expect(await tracesOf(left.benchId)).toEqual({ recordings: 0, events: 0, audits: 0 });
    await expectNoTemporarySince(before);
  });

  it('refuses with 403 when the sign-in was ended', async () => {
    const left = await createBenchWithAccounts();
    const cookie = await signInCookie(left.member);
    const end = () => AuthSession.destroy({ where: { accountId: left.member.id } });
    expectProblem(await uploadAround({ cookie, origin: baseUrl() }, end), 'forbidden');
    expect(await tracesOf(left.benchId)).toEqual({ recordings: 0, events: 0, audits: 0 });
  });
});
