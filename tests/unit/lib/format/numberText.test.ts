import { describe, expect, it } from 'vitest';
import { numberText, plainNumberText } from '#lib/format/numberText.ts';

describe('numberText', () => {
  it.each([
    [-12.5, 2, '−12.50'],
    [2874.04, 0, '2874'],
    [0, 1, '0.0'],
    [-0.04, 1, '0.0'],
    [1_000_000, 0, '1000000'],
  ])('writes %d with %d decimals as %s', (value, decimals, text) => {
    expect(numberText(value, decimals)).toBe(text);
  });

  it.each([Number.NaN, Number.POSITIVE_INFINITY])('refuses %d', (value) => {
    expect(() => numberText(value, 0)).toThrow('numberText: value must be finite');
  });
});

describe('plainNumberText', () => {
  it.each([
    [6, '6'],
    [4.5, '4.5'],
    [-0.25, '−0.25'],
  ])('writes %d as %s', (value, text) => {
    expect(plainNumberText(value)).toBe(text);
  });
});
