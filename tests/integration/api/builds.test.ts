import { beforeAll, describe, expect, it } from 'vitest';
import { type BuildView, buildView } from '#lib/schemas/build.ts';
import { AuditEntry } from '#server/models/AuditEntry.ts';
import { Build } from '#server/models/Build.ts';
import { addMember, createAccount, createBenchWithAccounts, type TestBench } from '#tests/factories/account.ts';
import { apiClient } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';

const BUILDS = '/api/v1/builds';
const GEOMETRY = { poles: 2, segments: 3, blades: null, teeth: null, magnets: null };
const CANARY = 'canary of another bench';

let bench: TestBench;
let foreign: TestBench;
let foreignBuildId: string;

async function createBuild(token: string, fields: object = {}): Promise<BuildView> {
  const answer = await apiClient({ token }).post(BUILDS, { name: 'Red can', geometry: GEOMETRY, ...fields });
  expect(answer.status, answer.text).toBe(201);
  return buildView.parse(answer.body);
}

beforeAll(async () => {
  [bench, foreign] = await Promise.all([createBenchWithAccounts(), createBenchWithAccounts(CANARY)]);
  foreignBuildId = (await createBuild(foreign.owner.token, { name: CANARY })).id;
});

describe('POST /api/v1/builds', () => {
  it('refuses nobody with 401, a foreign bench with 404, a viewer with 403', async () => {
    const body = { name: 'Red can', geometry: GEOMETRY };
    expectProblem(await apiClient().post(BUILDS, body), 'not-signed-in');
    const member = apiClient(bench.member);
    expectProblem(await member.post(BUILDS, { ...body, benchId: foreign.benchId }), 'not-found');
    expectProblem(await apiClient(bench.viewer).post(BUILDS, body), 'forbidden');
    expect(await Build.count({ where: { benchId: bench.benchId } })).toBe(0);
  });

  it('refuses a read token of an owner', async () => {
    const reader = await createAccount({ access: 'read' });
    await addMember(bench.benchId, reader, 'owner');
    expectProblem(await apiClient(reader).post(BUILDS, { name: 'Red can', geometry: GEOMETRY }), 'forbidden');
  });

  it('names every malformed field', async () => {
    const body = { name: ' ', geometry: { ...GEOMETRY, segments: 2.5 }, rpmMin: 0, notes: 7 };
    const answer = await apiClient(bench.member).post(BUILDS, body);
    expectProblem(answer, 'invalid-fields', ['geometry.segments', 'name', 'notes', 'rpmMin']);
  });

  it.each(['id', 'ownerId', 'createdBy', 'role', 'state', 'createdAt', 'revision'])(
    'refuses to be told %s',
    async (field) => {
      const answer = await apiClient(bench.member).post(BUILDS, { name: 'Red can', geometry: GEOMETRY, [field]: 1 });
      expectProblem(answer, 'invalid-fields', [field]);
    },
  );

  it.each([
    ['a negative', '-1'],
    ['minus zero', '-0'],
    ['text', '"1e5"'],
    ['Arabic digits', '"١٢"'],
    ['beyond a double', '1e309'],
    ['a decimal comma', '"1,5"'],
  ])('refuses %s as a number and says the range', async (_what, literal) => {
    const text = JSON.stringify({ name: 'Red can', geometry: GEOMETRY, eventsPerTurn: 6 }).replace(':6', `:${literal}`);
    const headers = { 'content-type': 'application/json' };
    const answer = await apiClient(bench.member).send(BUILDS, { method: 'POST', headers, body: text });
    expectProblem(answer, 'invalid-fields', ['eventsPerTurn']);
    expect(answer.text).toContain('above 0 and at most 1000');
  });

  it.each([
    ['a name that is 1 MB long', JSON.stringify({ name: 'x'.repeat(1_000_000), geometry: GEOMETRY }), 'name'],
    ['an unpaired surrogate', `{"name":"\\ud800","geometry":${JSON.stringify(GEOMETRY)}}`, 'name'],
    ['a NUL', `{"name":"a\\u0000b","geometry":${JSON.stringify(GEOMETRY)}}`, 'name'],
    [
      'lists 10,000 deep',
      `{"name":${'['.repeat(10_000)}${']'.repeat(10_000)},"geometry":${JSON.stringify(GEOMETRY)}}`,
      'name',
    ],
    ['__proto__', `{"name":"a","geometry":${JSON.stringify(GEOMETRY)},"__proto__":{"role":"owner"}}`, '__proto__'],
  ])('refuses %s and names the field', async (_what, text, field) => {
    const headers = { 'content-type': 'application/json' };
    const answer = await apiClient(bench.member).send(BUILDS, { method: 'POST', headers, body: text });
    expectProblem(answer, 'invalid-fields', [field]);
  });

  it('asks for the events per turn when no part of the geometry makes sound', async () => {
    const geometry = { ...GEOMETRY, segments: null };
    const answer = await apiClient(bench.member).post(BUILDS, { name: 'Unknown', geometry });
    expectProblem(answer, 'invalid-fields', ['eventsPerTurn']);
  });

  it('refuses odd magnets, an empty range of speeds, and a geometry above 1000 events', async () => {
    const member = apiClient(bench.member);
    const odd = { name: 'Odd', geometry: { ...GEOMETRY, segments: null, magnets: 7 } };
    expectProblem(await member.post(BUILDS, odd), 'invalid-fields', ['geometry.magnets']);
    const empty = { name: 'Empty', geometry: GEOMETRY, rpmMin: 900, rpmMax: 800 };
    expectProblem(await member.post(BUILDS, empty), 'invalid-fields', ['rpmMax']);
    const fine = { name: 'Fine', geometry: { ...GEOMETRY, poles: 399, segments: 400 } };
    expectProblem(await member.post(BUILDS, fine), 'invalid-fields', ['eventsPerTurn']);
  });

  it('computes lcm(2, 3) = 6 events per turn and answers 201 with its place', async () => {
    const answer = await apiClient(bench.member).post(BUILDS, { name: 'Red can', geometry: GEOMETRY });
    const build = buildView.parse(answer.body);
    expect(answer.headers.get('location')).toBe(`${BUILDS}/${build.id}`);
    expect(build).toMatchObject({
      benchId: bench.benchId,
      revision: 1,
      eventsPerTurn: 6,
      eventsPerTurnOrigin: 'geometry',
      orders: [6],
      recordingCount: 0,
      abilities: { canEdit: true },
    });
    const [entry] = await AuditEntry.findAll({ where: { benchId: bench.benchId, objectId: build.id } });
    expect(entry).toMatchObject({ action: 'build.created', actorAccountId: bench.member.id });
    expect(entry?.requestId).toBe(answer.headers.get('x-request-id'));
  });

  it('takes a given number over the geometry', async () => {
    const build = await createBuild(bench.member.token, { eventsPerTurn: 0.5 });
    expect(build).toMatchObject({ eventsPerTurn: 0.5, eventsPerTurnOrigin: 'given', orders: [] });
  });

  it('wants to know which bench when there are several', async () => {
    const account = await createAccount();
    await addMember(bench.benchId, account, 'member');
    await addMember(foreign.benchId, account, 'viewer');
    const client = apiClient(account);
    expectProblem(await client.post(BUILDS, { name: 'Red can', geometry: GEOMETRY }), 'invalid-fields', ['benchId']);
    const there = { name: 'Red can', geometry: GEOMETRY, benchId: foreign.benchId };
    expectProblem(await client.post(BUILDS, there), 'forbidden');
    const here = await client.post(BUILDS, { ...there, benchId: bench.benchId });
    expect(here.status).toBe(201);
  });
});

describe('GET /api/v1/builds', () => {
  it('refuses nobody with 401, a foreign bench with 404, malformed parameters with 422', async () => {
    expectProblem(await apiClient().get(BUILDS), 'not-signed-in');
    const viewer = apiClient(bench.viewer);
    expectProblem(await viewer.get(`${BUILDS}?benchId=${foreign.benchId}`), 'not-found');
    for (const [query, field] of [
      ['limit=0', 'limit'],
      ['limit=201', 'limit'],
      ['limit=1e1', 'limit'],
      ['cursor=%00', 'cursor'],
      ['benchId=1 OR 1=1', 'benchId'],
      ['benchId[]=x', 'benchId[]'],
      ['limit=1&limit=2', 'limit'],
      ['sort=name', 'sort'],
    ] as const) {
      expectProblem(await viewer.get(`${BUILDS}?${query}`), 'invalid-fields', [field]);
    }
  });

  it('pages through all builds of the own bench, newest first, and none of another', async () => {
    const own = await createBenchWithAccounts();
    const made: string[] = [];
    for (let count = 0; count < 5; count += 1) made.unshift((await createBuild(own.member.token)).id);
    const seen: string[] = [];
    let next = '';
    do {
      const answer = await apiClient(own.viewer).get(`${BUILDS}?limit=2${next}`);
      expect(answer.text).not.toContain(CANARY);
      const page = answer.body as { items: BuildView[]; nextCursor: string | null };
      seen.push(...page.items.map(({ id }) => id));
      next = page.nextCursor === null ? '' : `&cursor=${page.nextCursor}`;
    } while (next !== '');
    expect(seen).toEqual(made);
  });
});

describe('GET and PATCH /api/v1/builds/ID', () => {
  it('answers a foreign build exactly like one that does not exist', async () => {
    const absentId = crypto.randomUUID();
    for (const method of ['GET', 'PATCH'] as const) {
      const init = {
        method,
        ...(method === 'PATCH' && { body: '{}', headers: { 'content-type': 'application/json' } }),
      };
      const bodies = await Promise.all(
        [foreignBuildId, absentId].map(async (id) => {
          const answer = await apiClient(bench.owner).send(`${BUILDS}/${id}`, init);
          expectProblem(answer, 'not-found');
          return { ...(answer.body as object), requestId: '' };
        }),
      );
      expect(bodies[0]).toEqual(bodies[1]);
    }
  });

  it.each(['1 OR 1=1', '%2e%2e', '00000000-0000-0000-0000-000000000000', '9'.repeat(300), '%00', "'"])(
    'answers the identifier %s with 404',
    async (id) => {
      expectProblem(await apiClient(bench.owner).get(`${BUILDS}/${id}`), 'not-found');
    },
  );

  it('refuses a change by nobody, a viewer, a colleague, and one of another spelling', async () => {
    const { id } = await createBuild(bench.owner.token);
    const path = `${BUILDS}/${id}`;
    expectProblem(await apiClient().patch(path, { name: 'Mine' }), 'not-signed-in');
    expectProblem(await apiClient(bench.viewer).patch(path, { name: 'Mine' }), 'forbidden');
    expectProblem(await apiClient(bench.member).patch(path, { name: 'Mine' }), 'forbidden');
    expectProblem(await apiClient(bench.owner).patch(path, { eventsPerTurnOrigin: 'given' }), 'invalid-fields', [
      'eventsPerTurnOrigin',
    ]);
    expect((await apiClient(bench.owner).get(path)).body).toMatchObject({ name: 'Red can', revision: 1 });
    const denials = await AuditEntry.count({ where: { action: 'access.denied', actorAccountId: bench.member.id } });
    expect(denials).toBeGreaterThan(0);
  });

  it('lets the lead change the build of a member, and the member its own', async () => {
    const { id } = await createBuild(bench.member.token);
    for (const account of [bench.lead, bench.member]) {
      const answer = await apiClient(account).patch(`${BUILDS}/${id}`, { notes: account.name });
      expect(answer.body).toMatchObject({ notes: account.name, revision: 1, name: 'Red can' });
    }
  });

  it('raises the revision with another geometry and computes the events again', async () => {
    const { id } = await createBuild(bench.member.token);
    const answer = await apiClient(bench.member).patch(`${BUILDS}/${id}`, { geometry: { ...GEOMETRY, segments: 5 } });
    expect(answer.body).toMatchObject({ revision: 2, eventsPerTurn: 10, orders: [10] });
    const same = await apiClient(bench.member).patch(`${BUILDS}/${id}`, { geometry: { ...GEOMETRY, segments: 5 } });
    expect(same.body).toMatchObject({ revision: 2 });
  });

  it('keeps a given number through another geometry until it is taken back', async () => {
    const { id } = await createBuild(bench.member.token, { eventsPerTurn: 12, orders: [12, 24] });
    const member = apiClient(bench.member);
    const rebuilt = await member.patch(`${BUILDS}/${id}`, { geometry: { ...GEOMETRY, segments: 5 } });
    expect(rebuilt.body).toMatchObject({
      revision: 2,
      eventsPerTurn: 12,
      eventsPerTurnOrigin: 'given',
      orders: [12, 24],
    });
    const computed = await member.patch(`${BUILDS}/${id}`, { eventsPerTurn: null });
    expect(computed.body).toMatchObject({ eventsPerTurn: 10, eventsPerTurnOrigin: 'geometry', orders: [10] });
  });

  it('counts ten changes of geometry at once as ten revisions', async () => {
    const { id } = await createBuild(bench.member.token);
    const member = apiClient(bench.member);
    const changes = Array.from({ length: 10 }, (_, index) => ({ geometry: { ...GEOMETRY, segments: 11 + index } }));
    const answers = await Promise.all(changes.map((change) => member.patch(`${BUILDS}/${id}`, change)));
    expect(answers.map(({ status }) => status)).toEqual(changes.map(() => 200));
    expect((await member.get(`${BUILDS}/${id}`)).body).toMatchObject({ revision: 11 });
  });
});
