import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { leastCommonMultiple } from '#lib/motor/leastCommonMultiple.ts';

describe('leastCommonMultiple', () => {
  // Cogging periods a turn = lcm(slots, poles): check-values.json, orders/cog-*.
  it.each([
    [12, 14, 84],
    [9, 12, 36],
    [3, 2, 6],
    [12, 10, 60],
    [24, 20, 120],
    [5, 2, 10],
  ])('of %d and %d is %d', (a, b, expected) => {
    expect(leastCommonMultiple(a, b)).toBe(expected);
  });

  it('is a multiple of both and no smaller number is', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 60 }), fc.integer({ min: 1, max: 60 }), (a, b) => {
        const multiple = leastCommonMultiple(a, b);
        for (let smaller = 1; smaller < multiple; smaller++) {
          if (smaller % a === 0 && smaller % b === 0) return false;
        }
        return multiple % a === 0 && multiple % b === 0;
      }),
    );
  });

  it.each([0, -2, 1.5, Number.NaN])('refuses %d', (value) => {
    expect(() => leastCommonMultiple(value, 3)).toThrow(RangeError);
  });
});
