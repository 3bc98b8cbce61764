import { describe, expect, it } from 'vitest';
import { parseNumber } from '#lib/format/parseNumber.ts';

describe('parseNumber', () => {
  it.each([
    ['4.5', 4.5],
    ['4,5', 4.5],
    [' 12 ', 12],
    ['-3', -3],
    ['−3', -3],
    ['+0,05', 0.05],
  ])('reads %j as %d', (text, value) => {
    expect(parseNumber(text)).toBe(value);
  });

  it.each(['', '   '])('reads the empty box %j as null', (text) => {
    expect(parseNumber(text)).toBeNull();
  });

  it.each(['six', '1e5', '1.000,5', '1,000.5', '١٢', '0x10', '4.', '.5', '6 V', 'Infinity', 'NaN'])(
    'does not guess what %j means',
    (text) => {
      expect(parseNumber(text)).toBeNaN();
    },
  );
});
