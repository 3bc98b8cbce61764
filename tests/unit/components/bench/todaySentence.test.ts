import { describe, expect, it } from 'vitest';
import { todaySentence } from '#components/bench/todaySentence.ts';

describe('todaySentence', () => {
  it.each([
    [14, 3, '14 recordings came in since yesterday; 3 need a person.'],
    [1, 1, 'One recording came in since yesterday; one needs a person.'],
    [0, 0, 'No recording came in since yesterday; none needs a person.'],
  ])('with %d and %d', (cameInCount, needsPersonCount, sentence) => {
    expect(todaySentence({ cameInCount, needsPersonCount })).toBe(sentence);
  });
});
