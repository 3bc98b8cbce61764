import { describe, expect, it } from 'vitest';
import { uncertainDecimals, uncertainSentence, uncertainText } from '#lib/format/uncertainText.ts';

describe('uncertainDecimals', () => {
  it.each([
    ['6 rpm either way', { value: 2874, low: 2868.1, high: 2880.3 }, 0],
    ['60 rpm either way', { value: 2874, low: 2814, high: 2934 }, 0],
    ['0.6 rpm either way', { value: 59.9, low: 59.3, high: 60.5 }, 1],
    ['0.02 either way', { value: 4.31, low: 4.29, high: 4.33 }, 2],
    ['1e-9 either way at 1', { value: 1, low: 1 - 1e-9, high: 1 + 1e-9 }, 4],
    ['1e-4 either way at 320: five digits', { value: 320, low: 319.9999, high: 320.0001 }, 2],
    ['1e-4 either way at 20 000: five digits', { value: 20_000, low: 19_999.9999, high: 20_000.0001 }, 0],
    ['1e-9 either way at 0', { value: 0, low: -1e-9, high: 1e-9 }, 4],
    ['an empty interval', { value: 1, low: 1, high: 1 }, 0],
    ['an endless interval', { value: 1, low: Number.NEGATIVE_INFINITY, high: Number.POSITIVE_INFINITY }, 0],
    ['an interval that is not a number', { value: 1, low: Number.NaN, high: 2 }, 0],
  ])('for %s', (_, uncertain, decimals) => {
    expect(uncertainDecimals(uncertain)).toBe(decimals);
  });
});

describe('uncertainText', () => {
  it('gives value and bounds the same decimals', () => {
    expect(uncertainText({ value: 59.94, low: 59.3, high: 60.5 })).toEqual({
      value: '59.9',
      low: '59.3',
      high: '60.5',
    });
  });
});

describe('uncertainText of an interval finer than five digits', () => {
  it('rounds outwards instead of showing it empty', () => {
    expect(uncertainText({ value: 319.9999, low: 319.9998, high: 319.99996 })).toEqual({
      value: '320.00',
      low: '319.99',
      high: '320.00',
    });
  });
});

describe('uncertainSentence', () => {
  it('is one sentence with value, bounds and coverage', () => {
    expect(uncertainSentence({ value: 2874, low: 2868.1, high: 2880.3 }, 'rpm')).toBe(
      '2874 rpm, between 2868 and 2880 (95 %)',
    );
  });
});
