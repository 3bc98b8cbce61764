import { beforeAll, describe, expect, it } from 'vitest';
import { pageOf } from '#lib/schemas/page.ts';
import { readingView } from '#lib/schemas/reading.ts';
import { recordingView, type RecordingView } from '#lib/schemas/recording.ts';
import { Recording } from '#server/models/Recording.ts';
import { createBenchWithAccounts, type TestBench } from '#tests/factories/account.ts';
import { wavFile } from '#tests/factories/wavFile.ts';
import { apiClient } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';
import { tracesOf } from '#tests/support/traces.ts';
import { getRecordingView, RECORDINGS, untilAnalysed, upload } from '#tests/support/uploads.ts';

const NOBODYS_ID = '0198f6a0-0000-7000-8000-000000000000';
const page = pageOf(recordingView);

let bench: TestBench;
let foreign: TestBench;
let foreignId: string;
/** 223 events a second at two events a turn are 6690 rpm. */
let measured: RecordingView;

beforeAll(async () => {
  [bench, foreign] = await Promise.all([createBenchWithAccounts(), createBenchWithAccounts('canary bench')]);
  const sound = { bytes: wavFile({ durationSeconds: 3 }), fileName: 'canary.wav' };
  foreignId = (await upload(foreign.owner, sound)).id;
  const fields = { eventsPerTurn: '2', rpmMin: '4000', rpmMax: '8000', supplyVolts: '6', note: 'first' };
  const { id } = await upload(bench.member, { ...sound, fileName: 'own.wav', fields });
  measured = await untilAnalysed(bench.member, id);
});

const malformed = ['1%20OR%201=1', '..%2f..', '12345678901234567890', NOBODYS_ID.toUpperCase().replace('8000', '800G')];

describe.each([
  ['GET', ''],
  ['PATCH', ''],
  ['GET', '/readings'],
  ['POST', '/readings'],
  ['GET', '/original'],
  ['GET', '/playback'],
])('%s /api/v1/recordings/[id]%s', (method, suffix) => {
  const send = (client: ReturnType<typeof apiClient>, id: string) => {
    const path = `${RECORDINGS}/${id}${suffix}`;
    if (method === 'GET') return client.get(path);
    return method === 'PATCH' ? client.patch(path, {}) : client.post(path, {});
  };

  it('refuses nobody with 401, and a foreign, unknown or malformed id with the same 404', async () => {
    expectProblem(await send(apiClient(), foreignId), 'not-signed-in');
    const client = apiClient(bench.owner);
    const details = new Set<string>();
    for (const id of [foreignId, NOBODYS_ID]) {
      const answer = await send(client, id);
      expectProblem(answer, 'not-found');
      details.add((answer.body as { detail: string }).detail);
    }
    expect(details.size).toBe(1);
    for (const id of malformed) expect([404, 422]).toContain((await send(client, id)).status);
  });
});

describe('GET /api/v1/recordings/[id]', () => {
  it('tells all of a measured recording, to a viewer too, with what each may do', async () => {
    expect(measured).toMatchObject({
      benchId: bench.benchId,
      fileName: 'own.wav',
      status: 'done',
      error: null,
      supplyVolts: 6,
      note: 'first',
      media: { container: 'wav', codec: 'pcm_s16le', sampleRateHz: 16_000, channelCount: 1, durationSeconds: 3 },
      uploadedBy: { id: bench.member.id, name: 'The member' },
      abilities: { canReview: true, canEdit: true, canAnalyseAgain: true },
    });
    expect(measured.reading).toMatchObject({ status: 'measured', eventsPerTurn: 2, error: null });
    // 1 %: what the first engine promises on a clean constant sound.
    expect(Math.abs((measured.reading?.rpm ?? 0) / 6690 - 1)).toBeLessThan(0.01);
    expect(measured.reading?.settings).toMatchObject({ eventsPerTurn: 2, rpmMin: 4000, rpmMax: 8000, channel: 'auto' });
    const seen = await getRecordingView(bench.viewer, measured.id);
    expect(seen).toEqual({ ...measured, abilities: { canReview: false, canEdit: false, canAnalyseAgain: false } });
  });

  it('shows neither keys, blobs nor fences', async () => {
    const { text } = await apiClient(bench.member).get(`${RECORDINGS}/${measured.id}`);
    const row = await Recording.findOne({ where: { id: measured.id, benchId: bench.benchId }, rejectOnEmpty: true });
    expect(text).not.toContain(row.blobId);
    expect(text).not.toMatch(/blob|fence|lease|idempotency|attempt/i);
  });
});

describe('GET /api/v1/recordings', () => {
  it('refuses a foreign bench, unknown parameters and values that are none', async () => {
    const client = apiClient(bench.member);
    expectProblem(await client.get(`${RECORDINGS}?benchId=${foreign.benchId}`), 'not-found');
    for (const query of ['limit=0', 'limit=201', 'limit=1e1', 'status=lost', 'needsPerson=1', 'cursor=x', 'id[]=1']) {
      const answer = await client.get(`${RECORDINGS}?${query}`);
      expectProblem(answer, 'invalid-fields');
    }
  });

  it('pages newest first through every recording once, and never through those of another bench', async () => {
    const paged = await createBenchWithAccounts();
    const ids: string[] = [];
    for (let seed = 1; seed <= 5; seed += 1) ids.unshift((await upload(paged.member, { bytes: wavFile({ seed }) })).id);
    const found: string[] = [];
    let cursor: string | null = '';
    while (cursor !== null) {
      const query = cursor === '' ? 'limit=2' : `limit=2&cursor=${cursor}`;
      const answer = await apiClient(paged.viewer).get(`${RECORDINGS}?${query}`);
      expect(answer.text).not.toContain('canary');
      const { items, nextCursor } = page.parse(answer.body);
      found.push(...items.map(({ id }) => id));
      cursor = nextCursor;
    }
    expect(found).toEqual(ids);
  });

  it('filters by session, build, status and what needs a person', async () => {
    const client = apiClient(bench.owner);
    const session = await client.post('/api/v1/sessions', { title: 'Tuesday', purpose: 'speed-check' });
    const { id: sessionId } = session.body as { id: string };
    const inSession = await upload(bench.member, { bytes: wavFile({ seed: 7 }), fields: { sessionId } });
    const failed = await upload(bench.member, { bytes: wavFile({ seed: 8 }) });
    await untilAnalysed(bench.member, failed.id);
    const error = { errorCode: 'cannot-decode', errorMessage: 'The file is damaged.' };
    await Recording.update({ state: 'failed', ...error }, { where: { id: failed.id, benchId: bench.benchId } });
    const list = async (query: string) => page.parse((await client.get(`${RECORDINGS}?${query}`)).body).items;
    expect((await list(`sessionId=${sessionId}`)).map(({ id }) => id)).toEqual([inSession.id]);
    expect(await list(`buildId=${NOBODYS_ID}`)).toEqual([]);
    const [lost] = await list('status=failed');
    expect(lost).toMatchObject({ id: failed.id, needsPerson: true });
    expect(lost?.error).toEqual({ code: 'cannot-decode', message: 'The file is damaged.' });
    const waiting = (await list('needsPerson=true')).map(({ id }) => id);
    const settled = (await list('needsPerson=false')).map(({ id }) => id);
    expect(waiting).toContain(failed.id);
    expect(settled).toContain(measured.id);
    expect(waiting.filter((id) => settled.includes(id))).toEqual([]);
  });
});

describe('PATCH /api/v1/recordings/[id]', () => {
  const path = () => `${RECORDINGS}/${measured.id}`;

  it('refuses a viewer with 403 and a foreign session with 422', async () => {
    expectProblem(await apiClient(bench.viewer).patch(path(), { note: 'x' }), 'forbidden');
    const client = apiClient(bench.member);
    const session = await apiClient(foreign.owner).post('/api/v1/sessions', { title: 'x', purpose: 'class' });
    const { id: sessionId } = session.body as { id: string };
    expectProblem(await client.patch(path(), { sessionId }), 'invalid-fields', ['sessionId']);
  });

  it.each(['id', 'benchId', 'uploadedBy', 'state', 'reading', 'sha256', 'createdAt'])(
    'refuses to be told %s',
    async (name) => {
      expectProblem(await apiClient(bench.owner).patch(path(), { [name]: 'x' }), 'invalid-fields', [name]);
    },
  );

  it('refuses a member who did not record it, and lets a lead', async () => {
    const { id } = await upload(bench.owner, { bytes: wavFile({ seed: 9 }) });
    expectProblem(await apiClient(bench.member).patch(`${RECORDINGS}/${id}`, { note: 'x' }), 'forbidden');
    expect((await apiClient(bench.lead).patch(`${RECORDINGS}/${id}`, { note: 'x' })).status).toBe(200);
  });

  it('changes what is named, clears with null, leaves the rest and tells the others', async () => {
    const before = await tracesOf(bench.benchId);
    const answer = await apiClient(bench.member).patch(path(), { supplyVolts: 4.5, note: null });
    const { supplyVolts, note, reading } = recordingView.parse(answer.body);
    expect({ supplyVolts, note }).toEqual({ supplyVolts: 4.5, note: null });
    expect(reading).toEqual(measured.reading);
    const after = await tracesOf(bench.benchId);
    expect({ audits: after.audits - before.audits }).toEqual({ audits: 1 });
    expect(after.events).toBeGreaterThan(before.events);
  });
});

describe('POST /api/v1/recordings/[id]/readings', () => {
  const again = (holder: { token: string }, settings: object) =>
    apiClient(holder).post(`${RECORDINGS}/${measured.id}/readings`, settings);

  it('refuses a viewer with 403 and settings that cannot be', async () => {
    expectProblem(await again(bench.viewer, {}), 'forbidden');
    const cases: readonly [object, string][] = [
      [{ eventsPerTurn: 0 }, 'eventsPerTurn'],
      [{ rpmMin: 500, rpmMax: 400 }, 'rpmMax'],
      [{ channel: 1 }, 'channel'],
      [{ fromSeconds: 3 }, 'fromSeconds'],
      [{ fromSeconds: 2, toSeconds: 1 }, 'toSeconds'],
      [{ state: 'done' }, 'state'],
    ];
    for (const [settings, field] of cases)
      expectProblem(await again(bench.member, settings), 'invalid-fields', [field]);
  });

  it('answers 202, makes a second reading, keeps the first, and does nothing twice', async () => {
    const settings = { eventsPerTurn: 4, rpmMin: 2000, rpmMax: 4000 };
    const answers = await Promise.all([again(bench.member, settings), again(bench.member, settings)]);
    expect(answers.map(({ status }) => status)).toEqual([202, 202]);
    const { generation } = await Recording.findOne({
      where: { id: measured.id, benchId: bench.benchId },
      rejectOnEmpty: true,
    });
    const renewed = await untilAnalysed(bench.member, measured.id);
    expect(renewed.reading?.settings).toMatchObject(settings);
    expect(Math.abs((renewed.reading?.rpm ?? 0) / 3345 - 1)).toBeLessThan(0.01);
    const history = await apiClient(bench.viewer).get(`${RECORDINGS}/${measured.id}/readings`);
    const { items } = pageOf(readingView).parse(history.body);
    expect(items.map(({ id }) => id)).toEqual([renewed.reading?.id, measured.reading?.id]);
    // One wish for the pair; a bell that is rung again may add to it.
    expect(generation).toBeLessThanOrEqual(3);
  });
});
