import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { inkShare } from '#components/charts/spectrogramPicture.ts';

describe('inkShare', () => {
  it('is nothing at the floor and below', () => {
    expect([inkShare(0), inkShare(-20)]).toEqual([0, 0]);
  });

  it('never falls while the level rises, and stays within [0, 1]', () => {
    const level = fc.double({ min: -100, max: 100, noNaN: true });
    fc.assert(
      fc.property(level, level, (one, other) => {
        const [low, high] = [Math.min(one, other), Math.max(one, other)];
        expect(inkShare(high)).toBeGreaterThanOrEqual(inkShare(low));
        expect(inkShare(high)).toBeLessThanOrEqual(1);
      }),
    );
  });
});
