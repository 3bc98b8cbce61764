import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { floatSamples, wavBytes } from '#tests/fixtures/media/wavBytes.ts';
import { createMediaFolder } from '#tests/fixtures/media/makeMedia.ts';
import { BUZZ, BUZZ_RPM, encode, makeBuzz } from '#tests/support/labSounds.ts';
import { openWorkerLab } from '#tests/support/workerLab.ts';

const lab = await openWorkerLab();
const { addBench, benchIdOf, readingsOf, reload, toldStates, untilState, upload, wishAgain } =
  await import('#tests/support/labRecordings.ts');
const { ReadingSeries } = await import('#server/models/ReadingSeries.ts');
const { countLiveWorkers } = await import('#server/models/workerHeartbeats.ts');

/** From the last byte to the reading, for a recording of 10 s on an idle system. */
const BUDGET_SECONDS = 3;

const folder = await createMediaFolder();
let actor: Awaited<ReturnType<typeof addBench>>;

beforeAll(async () => {
  actor = await addBench();
  await lab.startWorker({ leaseSeconds: 30 });
});
afterAll(async () => {
  await lab.close();
  await folder.remove();
});

describe('analyseRecording', () => {
  it('turns 10 s of WAV into a reading within 3 s of the upload', async () => {
    const path = await makeBuzz(folder, 'ten.wav', 10);
    // The first job of a process also loads and compiles the engine.
    await untilState(await upload(actor, await makeBuzz(folder, 'first.wav', 1), BUZZ), 'done');
    const startedMilliseconds = performance.now();
    const recording = await untilState(await upload(actor, path, BUZZ), 'done');
    const tookSeconds = (performance.now() - startedMilliseconds) / 1000;
    const [reading] = await readingsOf(recording);
    expect(reading).toMatchObject({ id: recording.currentReadingId, status: 'measured', eventsPerTurn: 6 });
    expect(Math.abs((reading?.shaftSpeedRpm ?? 0) / BUZZ_RPM - 1)).toBeLessThan(0.01);
    expect(tookSeconds).toBeLessThan(BUDGET_SECONDS);
  });

  it('stores the series of the reading as 32-bit floats, the trend as long as the sound', async () => {
    const recording = await untilState(await upload(actor, await makeBuzz(folder, 'series.wav', 3), BUZZ), 'done');
    const where = { benchId: benchIdOf(actor), readingId: recording.currentReadingId ?? '' };
    const trend = await ReadingSeries.findOne({ where: { ...where, name: 'trend' }, rejectOnEmpty: true });
    const lengths = trend.columnsLayout.map(({ length }) => length);
    expect(trend.payload.length).toBe(4 * lengths.reduce((sum, length) => sum + length, 0));
    const last = trend.payload.readFloatLE(4 * ((lengths[0] ?? 0) - 1));
    expect(last).toBeGreaterThan(2.5);
    expect(last).toBeLessThanOrEqual(3);
  });

  it('reads what only ffmpeg can decode', async () => {
    const path = await encode(folder, await makeBuzz(folder, 'plain.wav', 4), 'phone.m4a');
    const recording = await untilState(await upload(actor, path, BUZZ), 'done');
    const [reading] = await readingsOf(recording);
    expect(Math.abs((reading?.shaftSpeedRpm ?? 0) / BUZZ_RPM - 1)).toBeLessThan(0.01);
  });

  it('tells pages of queued, working and done, each once', async () => {
    const recording = await untilState(await upload(actor, await makeBuzz(folder, 'told.wav', 2), BUZZ), 'done');
    expect(await toldStates(recording)).toEqual(['queued', 'working', 'done']);
  });

  it('takes the equal reading that exists when the same analysis is wished again', async () => {
    const first = await untilState(await upload(actor, await makeBuzz(folder, 'again.wav', 2), BUZZ), 'done');
    await wishAgain(first);
    const second = await untilState(first, 'done');
    expect(second.generation).toBe(2);
    expect(await readingsOf(second)).toHaveLength(1);
    expect(second.currentReadingId).toBe(first.currentReadingId);
  });

  it('stores an expected failure with its code and does not try again', async () => {
    // Float samples that are no numbers: only decoding shows it.
    const data = floatSamples(Array.from({ length: 48_000 }, () => Number.NaN));
    const bytes = wavBytes({ formatTag: 3, bitsPerSample: 32, sampleRateHz: 48_000, data });
    const path = await folder.write('not-numbers.wav', bytes);
    const recording = await untilState(await upload(actor, path), 'failed');
    expect(recording).toMatchObject({ errorCode: 'not-finite', attempt: 1, currentReadingId: null, fenceToken: null });
    expect(recording.errorMessage).toMatch(/\S/);
    expect(await toldStates(recording)).toEqual(['queued', 'working', 'failed']);
  });

  it('fails with file-missing when the stored file is gone', async () => {
    const { blobStorage } = await import('#server/storage/blobStorage.ts');
    const done = await untilState(await upload(actor, await makeBuzz(folder, 'gone.wav', 2), BUZZ), 'done');
    await blobStorage().remove(done.blobId);
    await wishAgain(done);
    await untilState(done, 'failed');
    expect(await reload(done)).toMatchObject({ errorCode: 'file-missing' });
  });

  it('gives a sign of life for readiness', async () => {
    expect(await countLiveWorkers(10)).toBe(1);
  });
});
