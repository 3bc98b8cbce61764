import { describe, expect, it } from 'vitest';
import { evenness } from '#components/recording/oneTurnWords.ts';

const bumps = (heights: readonly number[]) =>
  heights.flatMap((height) => Array.from({ length: 40 }, (_, point) => height * Math.sin((Math.PI * point) / 40)));

describe('evenness', () => {
  it('calls six equal bumps even', () => {
    expect(evenness(bumps([1, 1, 1, 1, 1, 1]), 6)).toEqual({ word: 'even', spreadFraction: 0 });
  });

  it('calls one bump at half the height of five others uneven', () => {
    const result = evenness(bumps([1, 1, 1, 1, 1, 0.5]), 6);
    expect(result?.word).toBe('uneven contacts');
    expect(result?.spreadFraction).toBeCloseTo(0.5 / (5.5 / 6), 10);
  });

  it('says nothing for a single bump, a fraction or too few points', () => {
    expect([evenness(bumps([1]), 1), evenness(bumps([1, 1]), 0.5), evenness([1, 2, 3], 6)]).toEqual([null, null, null]);
  });
});
