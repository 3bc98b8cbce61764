import { describe, expect, it } from 'vitest';
import { placedPoints, trendColumns, type TrendPoint } from '#components/session/trendPlot.ts';

const point = (recordingId: string, rpm: number, supplyVolts: number | null): TrendPoint => ({
  recordingId,
  recordedAt: '2026-12-01T10:00:00.000Z',
  buildName: 'Heron',
  supplyVolts,
  rpm,
  rpmLow: rpm - 5,
  rpmHigh: rpm + 5,
  confidence: 0.97,
  reviewed: false,
});
const points = [point('a', 2310, 7.5), point('b', 1000, null), point('c', 870, 3)];

describe('placedPoints', () => {
  it('counts from 1 in the order of recording', () => {
    expect(placedPoints(points, 'order').map(({ place }) => place)).toEqual([1, 2, 3]);
  });

  it('ascends by supply and leaves out what has none', () => {
    expect(placedPoints(points, 'supply').map(({ place, point: { recordingId } }) => [place, recordingId])).toEqual([
      [3, 'c'],
      [7.5, 'a'],
    ]);
  });
});

describe('trendColumns', () => {
  it('keeps 8 % of free room on both sides', () => {
    const [places, speeds] = trendColumns(placedPoints(points, 'supply'));
    expect(places).toEqual([3 - 0.36, 3, 7.5, 7.5 + 0.36]);
    expect(speeds).toEqual([null, 870, 2310, null]);
  });

  it('gives a single recording a stretch to stand on', () => {
    expect(trendColumns(placedPoints([point('a', 2310, 7.5)], 'order'))[0]).toEqual([0, 1, 2]);
  });

  it('leaves a speed of confidence 0.42 out of the line until a person has looked at it', () => {
    const unsure = { ...point('b', 5000, 5), confidence: 0.42 };
    const line = (middle: TrendPoint) =>
      trendColumns(placedPoints([point('a', 870, 3), middle, point('c', 2310, 7.5)], 'order'))[1];
    expect(line(unsure)).toEqual([null, 870, null, 2310, null]);
    expect(line({ ...unsure, reviewed: true })).toEqual([null, 870, 5000, 2310, null]);
  });
});
