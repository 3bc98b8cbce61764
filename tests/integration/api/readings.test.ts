import { beforeAll, describe, expect, it } from 'vitest';
import { reviewView, seriesView, type ReadingView } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { Reading } from '#server/models/Reading.ts';
import { ReadingSeries } from '#server/models/ReadingSeries.ts';
import { createBenchWithAccounts, type TestBench } from '#tests/factories/account.ts';
import { wavFile } from '#tests/factories/wavFile.ts';
import { apiClient } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';
import { tracesOf } from '#tests/support/traces.ts';
import { getRecordingView, untilAnalysed, upload } from '#tests/support/uploads.ts';

const READINGS = '/api/v1/readings';
const NOBODYS_ID = '0198f6a0-0000-7000-8000-000000000000';

let bench: TestBench;
let foreign: TestBench;
let recording: RecordingView;
let reading: ReadingView;

beforeAll(async () => {
  [bench, foreign] = await Promise.all([createBenchWithAccounts(), createBenchWithAccounts()]);
  const { id } = await upload(bench.member, { bytes: wavFile({ durationSeconds: 3 }), fields: { eventsPerTurn: '2' } });
  recording = await untilAnalysed(bench.member, id);
  if (recording.reading === null) throw new Error(`No reading: ${JSON.stringify(recording.error)}`);
  reading = recording.reading;
});

describe('GET /api/v1/readings/[id]/series/[name]', () => {
  const series = (holder: { token?: string }, name: string, id = reading.id) =>
    apiClient(holder).get(`${READINGS}/${id}/series/${name}`);

  it('refuses nobody with 401, foreign and unknown readings with 404, names that are none with no-such-series', async () => {
    expectProblem(await series({}, 'spectrum'), 'not-signed-in');
    expectProblem(await series(foreign.owner, 'spectrum'), 'not-found');
    expectProblem(await series(bench.viewer, 'spectrum', NOBODYS_ID), 'not-found');
    for (const name of ['loudness', '__proto__', 'spectrum%00']) {
      expectProblem(await series(bench.viewer, name), 'no-such-series');
    }
  });

  it('gives every series that the reading names, columns with units', async () => {
    for (const name of reading.seriesNames) {
      const answer = await series(bench.viewer, name);
      const view = seriesView.parse(answer.body);
      expect(view.name).toBe(name);
      expect(Object.keys(view.units)).toEqual(Object.keys(view.columns));
    }
    const trend = seriesView.parse((await series(bench.viewer, 'trend')).body);
    expect(trend.units).toMatchObject({ timeSeconds: 's', shaftSpeedRpm: 'rpm' });
    expect(trend.columns.shaftSpeedRpm).toHaveLength(trend.columns.timeSeconds?.length ?? -1);
  });

  it('says gaps as null, and 8192 points of two columns in less than 200 kB', async () => {
    const length = 8192;
    const frequencies = Float32Array.from({ length }, (_, bin) => bin * 2.9296875 + 0.123456789);
    const levels = Float32Array.from({ length }, (_, bin) => (bin === 5 ? Number.NaN : -10 + 30 * Math.sin(bin)));
    const columnsLayout = [
      { name: 'frequencyHz', unit: 'Hz', length },
      { name: 'levelDecibels', unit: 'dB', length },
    ];
    const payload = Buffer.concat([Buffer.from(frequencies.buffer), Buffer.from(levels.buffer)]);
    const where = { benchId: bench.benchId, readingId: reading.id, name: 'envelopeSpectrum' } as const;
    await ReadingSeries.destroy({ where });
    await ReadingSeries.create({ ...where, columnsLayout, payload });
    const answer = await series(bench.viewer, 'envelopeSpectrum');
    const { columns } = seriesView.parse(answer.body);
    expect(Buffer.byteLength(answer.text)).toBeLessThan(200_000);
    expect(columns.levelDecibels?.[5]).toBeNull();
    // Half a unit in the seventh digit beside half a unit of the 24-bit mantissa of a 32-bit float.
    const worst = Math.max(...frequencies.map((hz, bin) => Math.abs((columns.frequencyHz?.[bin] ?? 0) / hz - 1)));
    expect(worst).toBeLessThan(5e-7);
  });
});

describe('POST /api/v1/readings/[id]/reviews', () => {
  const review = (holder: { token?: string }, body: object, id = reading.id) =>
    apiClient(holder).post(`${READINGS}/${id}/reviews`, body);
  const CONFIRM = { decision: 'confirm', reason: 'strobe' };

  it('refuses nobody, a foreign bench, a viewer, and a member who did not record it', async () => {
    expectProblem(await review({}, CONFIRM), 'not-signed-in');
    expectProblem(await review(foreign.owner, CONFIRM), 'not-found');
    expectProblem(await review(bench.owner, CONFIRM, NOBODYS_ID), 'not-found');
    expectProblem(await review(bench.viewer, CONFIRM), 'forbidden');
    const { id } = await upload(bench.owner, { bytes: wavFile({ seed: 3 }) });
    const others = await untilAnalysed(bench.member, id);
    expectProblem(await review(bench.member, CONFIRM, others.reading?.id), 'forbidden');
    expect((await getRecordingView(bench.member, recording.id)).review).toBeNull();
  });

  it('names what is wrong', async () => {
    const cases: readonly [object, string][] = [
      [{ decision: 'maybe' }, 'decision'],
      [{ decision: 'choose' }, 'rpm'],
      [{ decision: 'confirm', rpm: 100 }, 'rpm'],
      [{ decision: 'choose', rpm: -1 }, 'rpm'],
      [{ decision: 'confirm', reason: 'x'.repeat(2001) }, 'reason'],
      [{ decision: 'confirm', reason: '\ud800' }, 'reason'],
      [{ ...CONFIRM, reviewerId: bench.owner.id }, 'reviewerId'],
    ];
    for (const [body, field] of cases) expectProblem(await review(bench.lead, body), 'invalid-fields', [field]);
  });

  it('keeps the reading as it was, and lets the newest review count', async () => {
    const before = await tracesOf(bench.benchId);
    const chosen = await review(bench.member, { decision: 'choose', rpm: 3000, reason: 'twice the blades' });
    expect(chosen.status, chosen.text).toBe(201);
    const first = reviewView.parse(chosen.body);
    expect(first).toMatchObject({ readingId: reading.id, decision: 'choose', rpm: 3000 });
    expect(first.reviewer).toEqual({ id: bench.member.id, name: 'The member' });
    await review(bench.lead, CONFIRM);
    const after = await getRecordingView(bench.viewer, recording.id);
    expect(after.review).toMatchObject({ decision: 'confirm', rpm: null, reason: 'strobe' });
    expect(after.reading).toEqual(reading);
    expect((await tracesOf(bench.benchId)).events).toBe(before.events + 2);
  });

  it('cannot be got round: the database itself refuses to change a reading', async () => {
    const change = Reading.update({ shaftSpeedRpm: 1 }, { where: { id: reading.id, benchId: bench.benchId } });
    await expect(change).rejects.toThrow(/immutable/);
  });
});
