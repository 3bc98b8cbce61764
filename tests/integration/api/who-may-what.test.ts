import { beforeAll, describe, expect, it } from 'vitest';
import { QueryTypes } from 'sequelize';
import { database } from '#server/database/connection.ts';
import { Build } from '#server/models/Build.ts';
import { Session } from '#server/models/Session.ts';
import { POLICY_TABLE } from '#server/policies/policyTable.ts';
import {
  addMember,
  createAccount,
  createBenchWithAccounts,
  type TestAccount,
  type TestBench,
} from '#tests/factories/account.ts';
import { createMeasuredRecording } from '#tests/factories/recording.ts';
import { type ApiAnswer, apiClient } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';

/** Every call of the API that is about one record or one bench, made by everyone who may not make it. */

const GEOMETRY = { poles: 2, segments: 3, blades: null, teeth: null, magnets: null };
const CANARY = 'canary-7f3a';

interface Ids {
  readonly build: string;
  readonly session: string;
  readonly recording: string;
  readonly reading: string;
}

/** For each call about a record: whose id stands in the path, and a body that would be accepted. */
const RECORD_CALLS: Readonly<Record<string, { of: keyof Ids; body?: object }>> = {
  'GET /api/v1/builds/[id]': { of: 'build' },
  'PATCH /api/v1/builds/[id]': { of: 'build', body: { notes: 'taken over' } },
  'GET /api/v1/sessions/[id]': { of: 'session' },
  'PATCH /api/v1/sessions/[id]': { of: 'session', body: { title: 'taken over' } },
  'GET /api/v1/sessions/[id]/result': { of: 'session' },
  'GET /api/v1/recordings/[id]': { of: 'recording' },
  'PATCH /api/v1/recordings/[id]': { of: 'recording', body: { note: 'taken over' } },
  'GET /api/v1/recordings/[id]/readings': { of: 'recording' },
  'POST /api/v1/recordings/[id]/readings': { of: 'recording', body: { eventsPerTurn: 3 } },
  'GET /api/v1/recordings/[id]/playback': { of: 'recording' },
  'GET /api/v1/recordings/[id]/original': { of: 'recording' },
  'POST /api/v1/readings/[id]/reviews': { of: 'reading', body: { decision: 'confirm', reason: 'taken over' } },
  'GET /api/v1/readings/[id]/series/[name]': { of: 'reading' },
};
const LISTS = ['/api/v1/builds', '/api/v1/sessions', '/api/v1/recordings'];
const WRITES = Object.keys(RECORD_CALLS).filter((call) => !call.startsWith('GET '));

let bench: TestBench;
let stranger: TestAccount;
let ids: Ids;

beforeAll(async () => {
  bench = await createBenchWithAccounts(CANARY);
  stranger = (await createBenchWithAccounts()).owner;
  const owned = { benchId: bench.benchId, createdBy: bench.owner.id };
  const events = { eventsPerTurn: 6, eventsPerTurnOrigin: 'given', ...GEOMETRY } as const;
  const build = await Build.create({ ...owned, ...events, name: CANARY });
  const session = await Session.create({ ...owned, title: CANARY, purpose: 'speed-check' });
  const row = { benchId: bench.benchId, uploadedBy: bench.owner.id, sessionId: session.id, buildId: build.id };
  const { recording, reading } = await createMeasuredRecording({ ...row, rpm: 3000, fileName: `${CANARY}.wav` });
  ids = { build: build.id, session: session.id, recording: recording.id, reading: reading.id };
});

function make(call: string, account: TestAccount | null, id: string): Promise<ApiAnswer> {
  const [method = '', route = ''] = call.split(' ');
  const path = route.replace('[id]', id).replace('[name]', 'spectrum');
  const body = RECORD_CALLS[call]?.body;
  const client = apiClient(account ?? {});
  if (body === undefined) return client.send(path, { method });
  return method === 'PATCH' ? client.patch(path, body) : client.post(path, body);
}

/** Number of rows of every table that a call could change, and when they last changed. */
async function stateOfBench(): Promise<unknown> {
  const select = { type: QueryTypes.SELECT, replacements: { benchId: bench.benchId } } as const;
  return database.query(
    `SELECT (SELECT GROUP_CONCAT(notes, updated_at) FROM builds WHERE bench_id = :benchId) AS builds,
       (SELECT GROUP_CONCAT(title, updated_at) FROM sessions WHERE bench_id = :benchId) AS sessions,
       (SELECT GROUP_CONCAT(note, state, generation) FROM recordings WHERE bench_id = :benchId) AS recordings,
       (SELECT COUNT(*) FROM reviews WHERE bench_id = :benchId) AS reviews,
       (SELECT COUNT(*) FROM outbox WHERE bench_id = :benchId) AS events`,
    select,
  );
}

describe('the calls about one record', () => {
  it('are all in this file', () => {
    const aboutRecords = Object.keys(POLICY_TABLE).filter((call) => call.includes('/api/v1/') && call.includes('[id]'));
    expect(Object.keys(RECORD_CALLS).toSorted()).toEqual(aboutRecords.toSorted());
  });

  it.each(Object.keys(RECORD_CALLS))('%s: nobody is sent to sign in', async (call) => {
    expectProblem(await make(call, null, ids[RECORD_CALLS[call]?.of ?? 'build']), 'not-signed-in');
  });

  it.each(Object.keys(RECORD_CALLS))(
    '%s: the owner of another bench sees the same as for no record at all',
    async (call) => {
      const before = await stateOfBench();
      const foreign = await make(call, stranger, ids[RECORD_CALLS[call]?.of ?? 'build']);
      const absent = await make(call, stranger, crypto.randomUUID());
      expectProblem(foreign, 'not-found');
      expect({ ...(foreign.body as object), requestId: '' }).toEqual({ ...(absent.body as object), requestId: '' });
      expect(foreign.text).not.toContain(CANARY);
      expect(await stateOfBench()).toEqual(before);
    },
  );

  it.each(WRITES)(
    '%s: a viewer, a colleague and a read token of the owner are refused, and nothing changes',
    async (call) => {
      const reader = await createAccount({ access: 'read' });
      await addMember(bench.benchId, reader, 'owner');
      const before = await stateOfBench();
      for (const account of [bench.viewer, bench.member, reader]) {
        expectProblem(await make(call, account, ids[RECORD_CALLS[call]?.of ?? 'build']), 'forbidden');
      }
      expect(await stateOfBench()).toEqual(before);
    },
  );

  it('lets a former member see nothing more', async () => {
    const former = await createAccount();
    for (const call of Object.keys(RECORD_CALLS).filter((name) => name.startsWith('GET '))) {
      expectProblem(await make(call, former, ids[RECORD_CALLS[call]?.of ?? 'build']), 'not-found');
    }
  });
});

describe('the lists', () => {
  it.each(LISTS)('%s: show members their bench, and strangers and benchless accounts none of it', async (path) => {
    expect((await apiClient(bench.viewer).get(path)).text).toContain(CANARY);
    for (const account of [stranger, await createAccount()]) {
      const answer = await apiClient(account).get(path);
      expect(answer.body).toEqual({ items: [], nextCursor: null });
    }
  });
});
