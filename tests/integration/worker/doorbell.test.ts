import { Queue } from 'bullmq';
import { Redis } from 'ioredis';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { createMediaFolder } from '#tests/fixtures/media/makeMedia.ts';
import { BUZZ, makeBuzz } from '#tests/support/labSounds.ts';
import { openWorkerLab, until } from '#tests/support/workerLab.ts';

const lab = await openWorkerLab();
const { addBench, readingsOf, reload, toldStates, untilState, upload } =
  await import('#tests/support/labRecordings.ts');
const { QUEUE_NAME } = await import('#server/queue/jobs.ts');
const { ringWorkers } = await import('#server/queue/ringWorkers.ts');

/** Two polls of an idle worker. */
const POLLED_WITHIN_SECONDS = 5;
/** The budget of a bell, and the time of a busy machine to come back to us. */
const RING_LIMIT_MILLISECONDS = 300 + 100;

const folder = await createMediaFolder();
let actor: Awaited<ReturnType<typeof addBench>>;
let path = '';

beforeAll(async () => {
  actor = await addBench();
  path = await makeBuzz(folder, 'short.wav', 2);
});
afterEach(() => lab.endWorkers());
afterAll(async () => {
  await lab.close();
  await folder.remove();
});

async function withRedis<Result>(body: (redis: Redis) => Promise<Result>): Promise<Result> {
  const redis = new Redis(lab.redisUrl);
  try {
    return await body(redis);
  } finally {
    redis.disconnect();
  }
}

describe('Redis', () => {
  it('flushed while a recording waits: the next worker finds it in the database', async () => {
    const recording = await upload(actor, path, BUZZ);
    await withRedis((redis) => redis.flushall());
    await lab.startWorker();
    expect(await readingsOf(await untilState(recording, 'done'))).toHaveLength(1);
  });

  it('flushed under a running worker: the worker goes on by looking into the database', async () => {
    await lab.startWorker();
    await withRedis((redis) => redis.flushall());
    const recording = await upload(actor, path, BUZZ);
    await untilState(recording, 'done', POLLED_WITHIN_SECONDS);
  });

  it('killed: an upload is acknowledged and its reading arrives', async () => {
    await lab.startWorker();
    await lab.stopRedis();
    const recording = await upload(actor, path, BUZZ);
    expect(recording.state).toBe('queued');
    await untilState(recording, 'done', POLLED_WITHIN_SECONDS);
    await lab.startRedis();
  });

  it('away when the worker starts: the worker works all the same', async () => {
    await lab.stopRedis();
    const recording = await upload(actor, path, BUZZ);
    const worker = await lab.startWorker();
    await untilState(recording, 'done');
    expect(await worker.end('SIGTERM')).toBe(0);
    await lab.startRedis();
  });

  it('stopped but not dead: a bell costs no more than its budget', async () => {
    await lab.startWorker();
    const recording = await upload(actor, path, BUZZ);
    await untilState(recording, 'done');
    lab.redis.child.kill('SIGSTOP');
    const startedMilliseconds = performance.now();
    await ringWorkers({ recordingId: recording.id, generation: 2 });
    expect(performance.now() - startedMilliseconds).toBeLessThan(RING_LIMIT_MILLISECONDS);
    const next = await upload(actor, path, BUZZ);
    await untilState(next, 'done', POLLED_WITHIN_SECONDS);
    lab.redis.child.kill('SIGCONT');
  });

  it('keeps nothing of finished jobs', async () => {
    // A worker that was killed before may have left a job that it had just taken.
    await withRedis((redis) => redis.flushall());
    await lab.startWorker();
    await untilState(await upload(actor, path, BUZZ), 'done');
    const queue = new Queue(QUEUE_NAME, { connection: { url: lab.redisUrl } });
    const countJobs = () => queue.getJobCounts('completed', 'failed', 'active', 'wait');
    await until('no job is left in Redis', async () => Object.values(await countJobs()).every((count) => count === 0));
    await queue.close();
  });
});

describe('a bell', () => {
  it('that is doubled, old or wrong leads to one reading', async () => {
    const recording = await upload(actor, path, BUZZ);
    const queue = new Queue(QUEUE_NAME, { connection: { url: lab.redisUrl } });
    // What an older version or an old file of Redis might bring.
    await queue.add('analyseRecording', { recordingId: recording.id, generation: 1 });
    await queue.add('analyseRecording', { recordingId: recording.id, generation: 1 });
    await queue.add('analyseRecording', { recordingId: 'nobody' });
    await queue.add('anotherJob', {});
    await lab.startWorker({ threadCount: 2 });
    const done = await untilState(recording, 'done');
    await queue.add('analyseRecording', { recordingId: recording.id, generation: 1 });
    const next = await untilState(await upload(actor, path, BUZZ), 'done');
    await queue.close();
    expect(await readingsOf(done)).toHaveLength(1);
    expect(await readingsOf(next)).toHaveLength(1);
    expect(await toldStates(done)).toEqual(['queued', 'working', 'done']);
    expect(await reload(done)).toMatchObject({ attempt: 1, currentReadingId: done.currentReadingId });
  });
});
