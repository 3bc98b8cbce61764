import { beforeAll, describe, expect, it } from 'vitest';
import { type SessionResultView, sessionResultView } from '#lib/schemas/session.ts';
import { Build } from '#server/models/Build.ts';
import { Session } from '#server/models/Session.ts';
import { createBenchWithAccounts, type TestBench } from '#tests/factories/account.ts';
import { createFailedRecording, createMeasuredRecording, createReview } from '#tests/factories/recording.ts';
import { apiClient } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';

let bench: TestBench;
let buildId: string;

beforeAll(async () => {
  bench = await createBenchWithAccounts();
  const owned = { benchId: bench.benchId, createdBy: bench.owner.id };
  buildId = (await Build.create({ ...owned, name: 'Red can', eventsPerTurn: 6, eventsPerTurnOrigin: 'given' })).id;
});

async function createSession(purpose: 'speed-check' | 'voltage-sweep', supplyVolts: number | null = null) {
  const { benchId, owner } = bench;
  const { id } = await Session.create({ benchId, title: 'Monday', purpose, supplyVolts, createdBy: owner.id });
  return { id, row: { benchId, uploadedBy: owner.id, sessionId: id, buildId } };
}

async function resultOf(sessionId: string): Promise<SessionResultView> {
  const answer = await apiClient(bench.viewer).get(`/api/v1/sessions/${sessionId}/result`);
  expect(answer.status, answer.text).toBe(200);
  return sessionResultView.parse(answer.body);
}

describe('GET /api/v1/sessions/ID/result', () => {
  it('refuses nobody with 401 and a foreign session with 404', async () => {
    const { id } = await createSession('speed-check');
    const foreign = await createBenchWithAccounts();
    expectProblem(await apiClient().get(`/api/v1/sessions/${id}/result`), 'not-signed-in');
    expectProblem(await apiClient(foreign.owner).get(`/api/v1/sessions/${id}/result`), 'not-found');
    expectProblem(await apiClient(bench.owner).get(`/api/v1/sessions/${id}/result?x=1`), 'invalid-fields', ['x']);
  });

  it('says what is missing while nothing is measured', async () => {
    const { id, row } = await createSession('speed-check');
    await createFailedRecording(row);
    expect(await resultOf(id)).toMatchObject({
      measuredCount: 0,
      points: [],
      figures: {},
      missing: [expect.any(String)],
    });
  });

  it('gives the mean of 2990, 3000 and 3010 rpm with ± 24.84 and the repeatability', async () => {
    const { id, row } = await createSession('speed-check', 6);
    for (const rpm of [2990, 3000, 3010]) await createMeasuredRecording({ ...row, rpm });
    const { figures, points, missing, sentence } = await resultOf(id);
    expect(points.map(({ rpm, supplyVolts, buildName }) => [rpm, supplyVolts, buildName])).toEqual([
      [2990, 6, 'Red can'],
      [3000, 6, 'Red can'],
      [3010, 6, 'Red can'],
    ]);
    // t for two degrees of freedom is 4.3027 (NIST Technical Note 1297, Table B.1: 4.30), the deviation is 10 rpm.
    expect(figures.meanSpeed?.value).toBe(3000);
    expect(figures.meanSpeed?.high).toBeCloseTo(3000 + (4.3027 * 10) / Math.sqrt(3), 2);
    expect(figures.speedSpread).toMatchObject({ value: 10, unit: 'rpm' });
    expect(figures.repeatability?.value).toBeCloseTo(27.7, 10);
    expect([missing, sentence]).toEqual([[], '3 recordings agree on 3000 rpm, between 2975 and 3025 (95 %).']);
  });

  it('leaves an unsure speed out until a person confirms it, takes the chosen one, and drops what did not turn', async () => {
    const { id, row } = await createSession('speed-check', 6);
    await createMeasuredRecording({ ...row, rpm: 3000 });
    const unsure = await createMeasuredRecording({ ...row, rpm: 1500, confidence: 0.3, halfWidthRpm: 1 });
    const still = await createMeasuredRecording({ ...row, rpm: 777 });
    await createReview(still.reading, { reviewerId: bench.lead.id, decision: 'nothing-turning' });
    const before = await resultOf(id);
    expect(before.measuredCount).toBe(2);
    expect(before.figures.meanSpeed).toEqual({ value: 3000, low: 2998, high: 3002, unit: 'rpm' });
    expect(before.missing.join(' ')).toContain('1 recording whose speed is unsure');

    await createReview(unsure.reading, { reviewerId: bench.lead.id, decision: 'choose', rpm: 3000 });
    const after = await resultOf(id);
    expect(after.points[1]).toMatchObject({ rpm: 3000, rpmLow: 2998, rpmHigh: 3002, reviewed: true });
    expect(after.figures.speedSpread).toMatchObject({ value: 0 });
  });

  it('finds 1000 rpm/V and 0.25 V of friction in a voltage sweep', async () => {
    const { id, row } = await createSession('voltage-sweep');
    for (const supplyVolts of [2, 3, 4, 5, 6]) {
      await createMeasuredRecording({ ...row, supplyVolts, rpm: 1000 * (supplyVolts - 0.25) });
    }
    const { figures } = await resultOf(id);
    expect(figures.speedConstant?.value).toBeCloseTo(1000, 6);
    expect(figures.speedConstant?.unit).toBe('rpm/V');
    expect(figures.noLoadOffset?.value).toBeCloseTo(0.25, 9);
    expect(figures.meanSpeed).toBeUndefined();
  });

  it('asks for a third voltage and for voltages that nobody wrote down', async () => {
    const { id, row } = await createSession('voltage-sweep');
    for (const supplyVolts of [2, 3, null]) await createMeasuredRecording({ ...row, supplyVolts, rpm: 2000 });
    const { figures, missing } = await resultOf(id);
    expect(figures).toEqual({});
    expect(missing).toEqual(['The supply voltage of 1 recording.', 'Recordings at 3 voltages or more; there are 2.']);
  });
});
