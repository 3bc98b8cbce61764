import { QueryTypes } from 'sequelize';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { DEFAULT_ANALYSIS_SETTINGS } from '#lib/analysis/settings.ts';
import { createMediaFolder } from '#tests/fixtures/media/makeMedia.ts';
import { makeBuzz } from '#tests/support/labSounds.ts';
import { openWorkerLab, until } from '#tests/support/workerLab.ts';

const lab = await openWorkerLab();
const { addBench, readingsOf, reload, toldStates, upload } = await import('#tests/support/labRecordings.ts');
const { database } = await import('#server/database/connection.ts');
const { withDatabaseLock } = await import('#server/database/withDatabaseLock.ts');
const { renewLease } = await import('#server/models/recordingClaims.ts');
const { claimRecording } = await import('#server/usecases/claimRecording.ts');
const { analyseAgain } = await import('#server/usecases/analyseAgain.ts');
const { failRecording } = await import('#server/usecases/failRecording.ts');
const { noteDecoderCrash } = await import('#server/usecases/noteDecoderCrash.ts');
const { requeueExpired } = await import('#server/usecases/requeueExpired.ts');
const { ringUndelivered } = await import('#server/usecases/ringUndelivered.ts');
const { storeReading } = await import('#server/usecases/storeReading.ts');

type LabRecording = Awaited<ReturnType<typeof upload>>;
type Claim = NonNullable<Awaited<ReturnType<typeof claimRecording>>>;

const leaseSeconds = 30;
const folder = await createMediaFolder();
let path = '';

beforeAll(async () => {
  path = await makeBuzz(folder, 'short.wav', 1);
});
beforeEach(() => write("/* every bench: a clean queue for each test */ UPDATE recordings SET state = 'done'"));
afterAll(async () => {
  await lab.close();
  await folder.remove();
});

async function write(sql: string, replacements: Record<string, string | number> = {}): Promise<void> {
  await database.query(sql, { type: QueryTypes.UPDATE, replacements });
}

/** Makes a lease run out, in database time, without waiting for it. */
async function expire(recording: LabRecording): Promise<void> {
  const { id, benchId } = recording;
  const past = 'lease_expires_at = NOW(3) - INTERVAL 1 SECOND';
  await write(`UPDATE recordings SET ${past} WHERE id = :id AND bench_id = :benchId`, { id, benchId });
}

async function mustClaim(): Promise<Claim> {
  const claim = await claimRecording({ leaseSeconds });
  if (claim === null) throw new Error('Nothing waits.');
  return claim;
}

const silence = {
  reading: {
    engineVersion: '0.0.1',
    status: 'no-rotation',
    motion: 'none',
    reason: 'silence',
    eventsPerTurn: 1,
    durationSeconds: 1,
    sampleRateHz: 48_000,
    candidates: [],
    warnings: [],
  },
  series: [],
} as const;
const resultFor = (claim: Claim) => ({
  claim,
  analysis: silence,
  settings: DEFAULT_ANALYSIS_SETTINGS,
  elapsedSeconds: 0.1,
});

describe('claimRecording', () => {
  it('returns null when nothing waits', async () => {
    expect(await claimRecording({ leaseSeconds })).toBeNull();
  });

  it('holds the row under a 16-byte token and a lease of 30 s in database time', async () => {
    const recording = await upload(await addBench(), path);
    const claim = await mustClaim();
    expect(claim).toMatchObject({ recordingId: recording.id, attempt: 1, generation: 1 });
    const held = await reload(recording);
    expect(held).toMatchObject({ state: 'working', attempt: 1 });
    expect(held.fenceToken).toEqual(claim.fenceToken);
    expect(claim.fenceToken).toHaveLength(16);
    const [row] = await database.query<{ leftSeconds: number }>(
      `SELECT TIMESTAMPDIFF(SECOND, NOW(3), lease_expires_at) AS leftSeconds FROM recordings
       WHERE id = :id AND bench_id = :benchId`,
      { type: QueryTypes.SELECT, replacements: { id: recording.id, benchId: recording.benchId } },
    );
    expect(row?.leftSeconds).toBeGreaterThanOrEqual(leaseSeconds - 5);
    expect(row?.leftSeconds).toBeLessThanOrEqual(leaseSeconds);
  });

  it('gives each of 12 recordings to exactly one of 12 claims at the same time', async () => {
    const actor = await addBench();
    const recordings = [];
    for (let count = 0; count < 12; count += 1) recordings.push(await upload(actor, path));
    const claims = await Promise.all(recordings.map(() => until('a claim', () => claimRecording({ leaseSeconds }))));
    const claimedIds = claims.map(({ recordingId }) => recordingId);
    expect(claimedIds.sort()).toEqual(recordings.map(({ id }) => id).sort());
  });

  it('serves the bench with the fewest running first, then takes turns', async () => {
    const [many, few] = [await addBench(), await addBench()];
    for (let count = 0; count < 4; count += 1) await upload(many, path);
    for (let count = 0; count < 2; count += 1) await upload(few, path);
    const benchIds = [];
    for (let count = 0; count < 6; count += 1) benchIds.push((await mustClaim()).benchId);
    const [a, b] = [many, few].map(({ memberships }) => memberships[0]?.benchId);
    expect(benchIds).toEqual([a, b, a, b, a, a]);
  });

  it('alternates between benches even with one slot, where none has anything running', async () => {
    const [first, second] = [await addBench(), await addBench()];
    for (let count = 0; count < 3; count += 1) await upload(first, path);
    for (let count = 0; count < 3; count += 1) await upload(second, path);
    const benchIds = [];
    for (let count = 0; count < 6; count += 1) {
      const claim = await mustClaim();
      benchIds.push(claim.benchId);
      await storeReading(resultFor(claim));
    }
    const [a, b] = [first, second].map(({ memberships }) => memberships[0]?.benchId);
    expect(benchIds).toEqual([a, b, a, b, a, b]);
  });

  it('takes an interactive recording before an older one of a batch', async () => {
    const actor = await addBench();
    const batch = await upload(actor, path);
    const { id, benchId } = batch;
    await write("UPDATE recordings SET priority = 'batch' WHERE id = :id AND bench_id = :benchId", { id, benchId });
    const interactive = await upload(actor, path);
    expect((await mustClaim()).recordingId).toBe(interactive.id);
    expect((await mustClaim()).recordingId).toBe(batch.id);
  });
});

describe('the fence', () => {
  it('refuses renewal, result and failure of a claim that was taken over', async () => {
    const recording = await upload(await addBench(), path);
    const late = await mustClaim();
    expect(await renewLease(late, leaseSeconds)).toBe(true);
    await expire(recording);
    await requeueExpired();
    const current = await mustClaim();
    expect(current.recordingId).toBe(recording.id);
    expect(await renewLease(late, leaseSeconds)).toBe(false);
    expect(await storeReading(resultFor(late))).toBe(false);
    expect(await failRecording({ claim: late, failure: { code: 'truncated', message: 'no' } })).toBe(false);
    expect(await readingsOf(recording)).toHaveLength(0);
    expect(await storeReading(resultFor(current))).toBe(true);
    expect(await storeReading(resultFor(current))).toBe(false);
    expect(await readingsOf(recording)).toHaveLength(1);
    expect(await toldStates(recording)).toEqual(['queued', 'working', 'queued', 'working', 'done']);
  });

  it('lets one of two simultaneous results of the same claim through', async () => {
    const recording = await upload(await addBench(), path);
    const claim = await mustClaim();
    const stored = await Promise.all([storeReading(resultFor(claim)), storeReading(resultFor(claim))]);
    expect(stored.filter(Boolean)).toHaveLength(1);
    expect(await readingsOf(recording)).toHaveLength(1);
  });
});

describe('requeueExpired', () => {
  it('leaves a lease alone that has not run out', async () => {
    const recording = await upload(await addBench(), path);
    await mustClaim();
    expect(await requeueExpired()).toEqual({ requeuedCount: 0, lostCount: 0 });
    expect(await reload(recording)).toMatchObject({ state: 'working' });
  });

  it('gives a recording up as worker-lost after five attempts', async () => {
    const recording = await upload(await addBench(), path);
    for (let attempt = 1; attempt <= 5; attempt += 1) {
      expect((await mustClaim()).attempt).toBe(attempt);
      await expire(recording);
      const isLast = attempt === 5;
      expect(await requeueExpired()).toEqual({ requeuedCount: isLast ? 0 : 1, lostCount: isLast ? 1 : 0 });
    }
    expect(await reload(recording)).toMatchObject({ state: 'failed', errorCode: 'worker-lost', fenceToken: null });
    expect((await toldStates(recording)).at(-1)).toBe('failed');
  });
});

describe('noteDecoderCrash', () => {
  it('puts a recording back after the first crash, fails it after the second, and forgets when asked again', async () => {
    const actor = await addBench();
    const recording = await upload(actor, path);
    expect(await noteDecoderCrash({ claim: await mustClaim() })).toBe('queued');
    const second = await mustClaim();
    expect(await noteDecoderCrash({ claim: second })).toBe('failed');
    expect(await noteDecoderCrash({ claim: second })).toBe('lost');
    expect(await reload(recording)).toMatchObject({
      state: 'failed',
      errorCode: 'cannot-decode',
      decoderCrashCount: 2,
    });
    await analyseAgain({ actor, recordingId: recording.id, request: {} });
    expect(await reload(recording)).toMatchObject({
      state: 'queued',
      errorCode: null,
      decoderCrashCount: 0,
      attempt: 0,
    });
    expect(await noteDecoderCrash({ claim: await mustClaim() })).toBe('queued');
  });
});

describe('ringUndelivered', () => {
  it('gives a recording that has waited 15 s a fresh number, and a newer one none', async () => {
    const actor = await addBench();
    const [old, fresh] = [await upload(actor, path), await upload(actor, path)];
    const { id, benchId } = old;
    const past = 'queued_at = NOW(3) - INTERVAL 16 SECOND';
    await write(`UPDATE recordings SET ${past} WHERE id = :id AND bench_id = :benchId`, { id, benchId });
    expect(await ringUndelivered()).toBe(1);
    expect(await reload(old)).toMatchObject({ state: 'queued', generation: 2, attempt: 0 });
    expect(await reload(fresh)).toMatchObject({ generation: 1 });
  });
});

describe('withDatabaseLock', () => {
  it('lets one of two in at a time', async () => {
    const inner = await withDatabaseLock('test', () => withDatabaseLock('test', () => Promise.resolve('in')));
    expect(inner).toBeNull();
    expect(await withDatabaseLock('test', () => Promise.resolve('in'))).toBe('in');
  });
});
