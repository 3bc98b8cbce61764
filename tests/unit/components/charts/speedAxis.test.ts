import { describe, expect, it } from 'vitest';
import { decadeTicks, logFraction } from '#components/charts/speedAxis.ts';

const RANGE = { minimumRpm: 60, maximumRpm: 60_000 };

describe('logFraction', () => {
  it('puts the geometric mean in the middle', () => {
    expect(logFraction(Math.sqrt(60 * 60_000), RANGE)).toBeCloseTo(0.5, 12);
  });

  it('gives a doubling the same length everywhere', () => {
    const doubling = (rpm: number) => logFraction(2 * rpm, RANGE) - logFraction(rpm, RANGE);
    expect(doubling(20_000)).toBeCloseTo(doubling(100), 12);
  });

  it('stays on the axis', () => {
    expect([logFraction(1, RANGE), logFraction(1e6, RANGE)]).toEqual([0, 1]);
  });
});

describe('decadeTicks', () => {
  it('labels the decades of 60 to 60 000 rpm', () => {
    const labelled = decadeTicks(RANGE).filter(({ isLabelled }) => isLabelled);
    expect(labelled.map(({ rpm }) => rpm)).toEqual([100, 1000, 10_000]);
  });

  it('labels 1, 2 and 5 in a narrow range', () => {
    const ticks = decadeTicks({ minimumRpm: 900, maximumRpm: 6000 });
    expect(ticks).toEqual([1000, 2000, 5000].map((rpm) => ({ rpm, isLabelled: true })));
  });
});
