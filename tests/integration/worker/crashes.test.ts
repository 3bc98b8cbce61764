import { QueryTypes } from 'sequelize';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { descendantsOf } from '#tests/fixtures/media/descendants.ts';
import { createMediaFolder } from '#tests/fixtures/media/makeMedia.ts';
import { BUZZ, encode, makeBuzz } from '#tests/support/labSounds.ts';
import { openWorkerLab, until } from '#tests/support/workerLab.ts';

const lab = await openWorkerLab();
const { addBench, readingsOf, reload, toldStates, untilState, upload } =
  await import('#tests/support/labRecordings.ts');
const { database } = await import('#server/database/connection.ts');

type LabRecording = Awaited<ReturnType<typeof upload>>;

/** The shortest lease there is; a lost worker is replaced after it. */
const LEASE_SECONDS = 2;
/** Long enough that its analysis outlasts the lease several times. */
const LONG_SECONDS = 300;

const folder = await createMediaFolder();
let actor: Awaited<ReturnType<typeof addBench>>;
let shortPath = '';
let longPath = '';

beforeAll(async () => {
  actor = await addBench();
  shortPath = await makeBuzz(folder, 'short.wav', 2);
  longPath = await makeBuzz(folder, 'long.wav', LONG_SECONDS);
});
afterEach(() => lab.endWorkers());
afterAll(async () => {
  await lab.close();
  await folder.remove();
});

/** Uploads the long recording and waits until a worker has claimed it. */
async function claimedLongRecording(): Promise<LabRecording> {
  return untilState(await upload(actor, longPath, BUZZ), 'working');
}

async function expectOneReading(recording: LabRecording): Promise<void> {
  expect(await readingsOf(recording)).toHaveLength(1);
  const states = await toldStates(recording);
  expect(states.filter((state) => state === 'done')).toHaveLength(1);
}

describe('a worker that is killed', () => {
  it('in the middle of a job loses nothing and doubles nothing', async () => {
    const first = await lab.startWorker({ leaseSeconds: LEASE_SECONDS });
    const recording = await claimedLongRecording();
    await first.end('SIGKILL');
    expect(await reload(recording)).toMatchObject({ state: 'working', currentReadingId: null });
    await lab.startWorker({ leaseSeconds: LEASE_SECONDS });
    const done = await untilState(recording, 'done', 60);
    expect(done.attempt).toBe(2);
    await expectOneReading(done);
  });

  it('for the fifth time on one recording gives it up as worker-lost', async () => {
    await lab.startWorker({ leaseSeconds: LEASE_SECONDS });
    const recording = await claimedLongRecording();
    await lab.endWorkers();
    // Four more claims by workers that died, as the rows would tell.
    await database.query('UPDATE recordings SET attempt = 5 WHERE id = :id AND bench_id = :benchId', {
      type: QueryTypes.UPDATE,
      replacements: { id: recording.id, benchId: recording.benchId },
    });
    await lab.startWorker({ leaseSeconds: LEASE_SECONDS });
    const failed = await untilState(recording, 'failed');
    expect(failed).toMatchObject({ errorCode: 'worker-lost', currentReadingId: null, fenceToken: null });
    const next = await upload(actor, shortPath, BUZZ);
    await untilState(next, 'done');
  });
});

describe('a worker that stands still for longer than its lease', () => {
  it('is replaced, and its late result is refused by the fence', async () => {
    const stopped = await lab.startWorker({ leaseSeconds: LEASE_SECONDS });
    const recording = await claimedLongRecording();
    stopped.child.kill('SIGSTOP');
    await lab.startWorker({ leaseSeconds: LEASE_SECONDS });
    const done = await untilState(recording, 'done', 60);
    expect(done.attempt).toBe(2);
    stopped.child.kill('SIGCONT');
    await stopped.says('the claim on a recording was lost');
    const after = await reload(recording);
    expect(after).toMatchObject({ state: 'done', currentReadingId: done.currentReadingId });
    await expectOneReading(after);
  });
});

describe('a worker that is busy', () => {
  it('renews its claim while the analysis runs for longer than the lease', async () => {
    await lab.startWorker({ leaseSeconds: LEASE_SECONDS });
    const done = await untilState(await claimedLongRecording(), 'done', 60);
    const [reading] = await readingsOf(done);
    expect(reading?.elapsedSeconds).toBeGreaterThan(LEASE_SECONDS);
    expect(done.attempt).toBe(1);
  });
});

describe('a worker that is asked to stop', () => {
  it('ends at once when it has nothing to do, with status 0', async () => {
    const worker = await lab.startWorker();
    expect(await worker.end('SIGTERM')).toBe(0);
  });

  it('claims nothing more but finishes what it has', async () => {
    const worker = await lab.startWorker({ leaseSeconds: 30 });
    const recording = await untilState(await upload(actor, await makeBuzz(folder, 'stop.wav', 20), BUZZ), 'working');
    const waiting = await upload(actor, shortPath, BUZZ);
    expect(await worker.end('SIGTERM')).toBe(0);
    expect(await reload(recording)).toMatchObject({ state: 'done' });
    expect(await reload(waiting)).toMatchObject({ state: 'queued', attempt: 0 });
    await lab.startWorker();
    await untilState(waiting, 'done');
  });

  it('gives a long job back at once, without counting it as a lost attempt', async () => {
    const worker = await lab.startWorker({ leaseSeconds: 30 });
    const recording = await claimedLongRecording();
    expect(await worker.end('SIGTERM')).toBe(0);
    const released = await reload(recording);
    expect(released).toMatchObject({ state: 'queued', attempt: 0, generation: 2, fenceToken: null });
    await lab.startWorker({ leaseSeconds: 30 });
    await expectOneReading(await untilState(recording, 'done', 60));
  });
});

describe('a file that kills its decoder', () => {
  it('is tried twice, then fails with cannot-decode, and the worker goes on', async () => {
    const worker = await lab.startWorker({ leaseSeconds: 30 });
    const path = await encode(folder, longPath, 'long.flac');
    const recording = await upload(actor, path, BUZZ);
    const killDecoder = async (): Promise<boolean> => {
      const tools = (await descendantsOf(recording.blobId)).filter(({ name }) => name === 'ffmpeg');
      for (const { pid } of tools) process.kill(pid, 'SIGKILL');
      return tools.length > 0;
    };
    await until('the first decoder was killed', killDecoder);
    await until('the first crash was counted', async () => (await reload(recording)).decoderCrashCount === 1);
    await until('the second decoder was killed', killDecoder);
    const failed = await untilState(recording, 'failed');
    expect(failed).toMatchObject({ errorCode: 'cannot-decode', decoderCrashCount: 2, attempt: 2 });
    const next = await upload(actor, shortPath, BUZZ);
    await untilState(next, 'done');
    expect(worker.hasEnded).toBe(false);
  });
});
