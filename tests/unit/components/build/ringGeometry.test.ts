import { describe, expect, it } from 'vitest';
import { cutRing, evenly, pointOnRing, sectorPath } from '#components/build/ringGeometry.ts';

describe('pointOnRing', () => {
  it('starts at the top and turns clockwise', () => {
    expect(pointOnRing(10, 0)).toEqual({ x: 0, y: -10 });
    const quarter = pointOnRing(10, 0.25);
    expect(quarter.x).toBeCloseTo(10, 12);
    expect(quarter.y).toBeCloseTo(0, 12);
  });
});

describe('sectorPath', () => {
  it('takes the long way round from a half turn on', () => {
    const band = { innerRadius: 5, outerRadius: 10 };
    expect(sectorPath(band, 0, 0.25)).toContain('A10 10 0 0 1');
    expect(sectorPath(band, 0, 0.75)).toContain('A10 10 0 1 1');
  });
});

describe('cutRing', () => {
  it.each([2, 3, 5, 7, 48, 400])('cuts a ring into %i parts, all different', (count) => {
    const parts = cutRing({ innerRadius: 44, outerRadius: 68 }, count);
    expect(new Set(parts).size).toBe(count);
  });
});

describe('evenly', () => {
  it('spreads three over the turn', () => {
    expect(evenly(3)).toEqual([0, 1 / 3, 2 / 3]);
  });
});
