import { describe, expect, it } from 'vitest';
import { type SessionPoint, sessionVerdict } from '#server/usecases/sessionVerdict.ts';

function point(rpm: number, fields: Partial<SessionPoint> = {}): SessionPoint {
  return {
    recordingId: '018f0000-0000-7000-8000-000000000000',
    recordedAt: '2026-05-01T10:00:00.000Z',
    buildName: 'Red can',
    motor: 'red-can 1',
    supplyVolts: 6,
    rpm,
    rpmLow: rpm - 2,
    rpmHigh: rpm + 2,
    confidence: 0.97,
    reviewed: false,
    ...fields,
  };
}

describe('sessionVerdict', () => {
  it('claims nothing without a recording', () => {
    const verdict = sessionVerdict('speed-check', []);
    expect(verdict).toEqual({
      sentence: 'No speed is measured yet.',
      missing: ['A recording with a speed.'],
      figures: {},
    });
  });

  it('gives the interval of the reading itself for one recording, and asks for a second', () => {
    const { figures, sentence, missing } = sessionVerdict('speed-check', [point(3000)]);
    expect(figures).toEqual({
      meanSpeed: { value: 3000, low: 2998, high: 3002, unit: 'rpm' },
    });
    expect(sentence).toBe('One recording: 3000 rpm, between 2998 and 3002 (95 %).');
    expect(missing).toHaveLength(1);
  });

  it('tells no repeatability for recordings at different voltages', () => {
    const points = [point(3000), point(3010, { supplyVolts: 6.1 })];
    const { figures, missing } = sessionVerdict('speed-check', points);
    expect(Object.keys(figures)).toEqual(['meanSpeed', 'speedSpread']);
    expect(missing).toEqual(['One supply voltage for all, to tell the repeatability.']);
  });

  it('takes no mean over several motors, nor over revisions of one', () => {
    for (const motor of ['blue-can 1', 'red-can 2', null]) {
      expect(sessionVerdict('class', [point(3000), point(3100, { motor })]).figures).toEqual({});
    }
  });

  it('leaves a confidence of 0.49 out, keeps 0.5, and keeps 0.1 that a person confirmed', () => {
    const points = [
      point(3000, { confidence: 0.5 }),
      point(1500, { confidence: 0.49 }),
      point(3002, { confidence: 0.1, reviewed: true }),
    ];
    const { figures, missing } = sessionVerdict('speed-check', points);
    expect(figures.meanSpeed?.value).toBe(3001);
    expect(missing).toEqual(['A person’s word on 1 recording whose speed is unsure; until then it does not count.']);
  });

  it('fits the line of a sweep, repeated voltages included', () => {
    const points = [2, 2, 3, 4].map((supplyVolts) => point(1000 * supplyVolts - 250, { supplyVolts }));
    const { figures, missing } = sessionVerdict('voltage-sweep', points);
    expect(figures.speedConstant).toMatchObject({ value: 1000, unit: 'rpm/V' });
    expect(figures.noLoadOffset?.value).toBeCloseTo(0.25, 12);
    expect(missing).toEqual([]);
  });

  it.each([3008, 12_030])('claims no line when the speed at 5 V is %i rpm, and names that recording', (wrongRpm) => {
    const points = [1989, 3007, 3995, 5012, wrongRpm].map((rpm, index) => point(rpm, { supplyVolts: index + 1 }));
    const { figures, sentence, missing } = sessionVerdict('voltage-sweep', points);
    expect(figures).toEqual({});
    expect(sentence).toContain(
      `The recording at 5 V (${String(wrongRpm)} rpm) does not fit the line of the others, which expect about 6015 rpm`,
    );
    expect(missing).toEqual([expect.stringContaining('the recording at 5 V')]);
  });

  it('keeps a line whose points scatter by 0.5 %, and an exact one with a point 0.9 % off', () => {
    for (const rpms of [
      [1990, 3015, 3980, 5025, 5990],
      [2000, 3000, 4036, 5000, 6000],
    ]) {
      const points = rpms.map((rpm, index) => point(rpm, { supplyVolts: index + 1 }));
      expect(sessionVerdict('voltage-sweep', points).figures).toHaveProperty('speedConstant');
    }
  });

  it('gives no offset while the line is not sure to rise', () => {
    const points = [2, 3, 4].map((supplyVolts, index) => point([3000, 2000, 3100][index] ?? 0, { supplyVolts }));
    const { figures, missing } = sessionVerdict('voltage-sweep', points);
    expect(Object.keys(figures)).toEqual(['speedConstant']);
    expect(missing).toEqual(['More voltages, further apart: the line is not sure to rise.']);
  });

  it('fits no line through several motors', () => {
    const points = [2, 3, 4].map((supplyVolts) => point(1000, { supplyVolts, motor: String(supplyVolts) }));
    expect(sessionVerdict('voltage-sweep', points).figures).toEqual({});
  });

  it.each(['coast-down', 'run-time', 'load', 'batch', 'class'] as const)(
    'says that %s has no method of its own yet',
    (purpose) => {
      const { missing } = sessionVerdict(purpose, [point(3000), point(3001)]);
      expect(missing.join(' ')).toContain('yet');
    },
  );
});
