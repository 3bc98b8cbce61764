import { beforeAll, describe, expect, it } from 'vitest';
import { type SessionView, sessionView } from '#lib/schemas/session.ts';
import { Build } from '#server/models/Build.ts';
import { Session } from '#server/models/Session.ts';
import { createBenchWithAccounts, type TestBench } from '#tests/factories/account.ts';
import { createFailedRecording, createMeasuredRecording, createReview } from '#tests/factories/recording.ts';
import { apiClient } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';

const SESSIONS = '/api/v1/sessions';
const CANARY = 'canary of another bench';
const SPEED_CHECK = { title: 'Monday', purpose: 'speed-check' };

let bench: TestBench;
let foreign: TestBench;
let foreignSessionId: string;
let foreignBuildId: string;

async function createSession(token: string, fields: object = {}): Promise<SessionView> {
  const answer = await apiClient({ token }).post(SESSIONS, { ...SPEED_CHECK, ...fields });
  expect(answer.status, answer.text).toBe(201);
  return sessionView.parse(answer.body);
}

async function createBuild({ benchId, owner }: TestBench): Promise<string> {
  const columns = {
    benchId,
    name: 'Red can',
    eventsPerTurn: 6,
    eventsPerTurnOrigin: 'given',
    createdBy: owner.id,
  } as const;
  return (await Build.create(columns)).id;
}

beforeAll(async () => {
  [bench, foreign] = await Promise.all([createBenchWithAccounts(), createBenchWithAccounts(CANARY)]);
  foreignSessionId = (await createSession(foreign.owner.token, { title: CANARY })).id;
  foreignBuildId = await createBuild(foreign);
});

describe('POST /api/v1/sessions', () => {
  it('refuses nobody with 401, a foreign bench with 404, a viewer with 403', async () => {
    expectProblem(await apiClient().post(SESSIONS, SPEED_CHECK), 'not-signed-in');
    expectProblem(
      await apiClient(bench.member).post(SESSIONS, { ...SPEED_CHECK, benchId: foreign.benchId }),
      'not-found',
    );
    expectProblem(await apiClient(bench.viewer).post(SESSIONS, SPEED_CHECK), 'forbidden');
    expect(await Session.count({ where: { benchId: bench.benchId } })).toBe(0);
  });

  it('names malformed and unknown fields', async () => {
    const body = { title: '', purpose: 'fun', conditions: { supplyVolts: -1, load: 'a\nb' }, ownerId: 'x' };
    const answer = await apiClient(bench.member).post(SESSIONS, body);
    expectProblem(answer, 'invalid-fields', [
      'title',
      'purpose',
      'conditions.supplyVolts',
      'conditions.load',
      'ownerId',
    ]);
  });

  it('takes a foreign build for one that does not exist', async () => {
    const bodies = [];
    for (const buildId of [foreignBuildId, crypto.randomUUID()]) {
      const answer = await apiClient(bench.member).post(SESSIONS, { ...SPEED_CHECK, buildId });
      expectProblem(answer, 'invalid-fields', ['buildId']);
      bodies.push({ ...(answer.body as object), requestId: '' });
    }
    expect(bodies[0]).toEqual(bodies[1]);
  });

  it('makes a session with its conditions and answers 201 with its place', async () => {
    const buildId = await createBuild(bench);
    const conditions = { supplyVolts: 6, load: 'fan, 2 blades', ambientCelsius: 21.5, note: 'by the window' };
    const answer = await apiClient(bench.member).post(SESSIONS, {
      ...SPEED_CHECK,
      title: ' Monday ',
      buildId,
      conditions,
    });
    const session = sessionView.parse(answer.body);
    expect(answer.headers.get('location')).toBe(`${SESSIONS}/${session.id}`);
    expect(session).toMatchObject({
      title: 'Monday',
      build: { id: buildId, name: 'Red can', revision: 1 },
      conditions,
      createdBy: { id: bench.member.id },
      recordingCount: 0,
      needsPersonCount: 0,
      abilities: { canEdit: true, canAddRecording: true },
    });
  });
});

describe('GET /api/v1/sessions', () => {
  it('refuses nobody with 401, a foreign bench with 404, malformed parameters with 422', async () => {
    expectProblem(await apiClient().get(SESSIONS), 'not-signed-in');
    expectProblem(await apiClient(bench.viewer).get(`${SESSIONS}?benchId=${foreign.benchId}`), 'not-found');
    expectProblem(await apiClient(bench.viewer).get(`${SESSIONS}?limit=x`), 'invalid-fields', ['limit']);
    expectProblem(await apiClient(bench.viewer).get(`${SESSIONS}?cursor=bm90~`), 'invalid-fields', ['cursor']);
  });

  it('pages through the own bench and counts what waits for a person', async () => {
    const own = await createBenchWithAccounts();
    const [first, second] = [await createSession(own.member.token), await createSession(own.member.token)];
    const row = { benchId: own.benchId, uploadedBy: own.member.id, sessionId: first.id };
    await createMeasuredRecording({ ...row, rpm: 3000 });
    await createMeasuredRecording({ ...row, rpm: 1500, confidence: 0.2 });
    const reviewed = await createMeasuredRecording({ ...row, rpm: 1500, confidence: 0.2 });
    await createReview(reviewed.reading, { reviewerId: own.lead.id, decision: 'confirm' });
    await createFailedRecording(row);

    const page = await apiClient(own.viewer).get(`${SESSIONS}?limit=1`);
    expect(page.body).toMatchObject({ items: [{ id: second.id, recordingCount: 0, needsPersonCount: 0 }] });
    const { nextCursor } = page.body as { nextCursor: string };
    const rest = await apiClient(own.viewer).get(`${SESSIONS}?cursor=${nextCursor}`);
    expect(rest.body).toMatchObject({
      items: [{ id: first.id, recordingCount: 4, needsPersonCount: 2 }],
      nextCursor: null,
    });
    expect(page.text + rest.text).not.toContain(CANARY);
  });
});

describe('GET and PATCH /api/v1/sessions/ID', () => {
  it('answers a foreign session exactly like one that does not exist', async () => {
    const bodies = [];
    for (const id of [foreignSessionId, crypto.randomUUID()]) {
      const read = await apiClient(bench.owner).get(`${SESSIONS}/${id}`);
      const write = await apiClient(bench.owner).patch(`${SESSIONS}/${id}`, { title: 'Mine' });
      expectProblem(read, 'not-found');
      expectProblem(write, 'not-found');
      bodies.push([read, write].map(({ body }) => ({ ...(body as object), requestId: '' })));
    }
    expect(bodies[0]).toEqual(bodies[1]);
  });

  it('refuses a change by a viewer and by a colleague, and a malformed one', async () => {
    const { id } = await createSession(bench.owner.token);
    const path = `${SESSIONS}/${id}`;
    for (const account of [bench.viewer, bench.member]) {
      expectProblem(await apiClient(account).patch(path, { title: 'Mine' }), 'forbidden');
    }
    expectProblem(await apiClient(bench.owner).patch(path, { id: 'x' }), 'invalid-fields', ['id']);
    expectProblem(await apiClient(bench.owner).patch(path, { buildId: foreignBuildId }), 'invalid-fields', ['buildId']);
    expect((await apiClient(bench.viewer).get(path)).body).toMatchObject({
      title: 'Monday',
      abilities: { canEdit: false, canAddRecording: false },
    });
  });

  it('changes what is named and keeps the rest', async () => {
    const buildId = await createBuild(bench);
    const { id } = await createSession(bench.member.token, { buildId, conditions: { supplyVolts: 3 } });
    const lead = apiClient(bench.lead);
    const renamed = await lead.patch(`${SESSIONS}/${id}`, { title: 'Tuesday' });
    expect(renamed.body).toMatchObject({ title: 'Tuesday', build: { id: buildId }, conditions: { supplyVolts: 3 } });
    const cleared = await lead.patch(`${SESSIONS}/${id}`, { buildId: null, conditions: { load: 'none' } });
    expect(cleared.body).toMatchObject({
      title: 'Tuesday',
      build: null,
      conditions: { supplyVolts: null, load: 'none' },
    });
  });
});
