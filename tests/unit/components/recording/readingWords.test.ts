import { describe, expect, it } from 'vitest';
import {
  confidenceWords,
  failureAdvice,
  MOTION_WORDS,
  NO_ROTATION_EXPLANATIONS,
  WARNING_WORDS,
  warningWords,
} from '#components/recording/readingWords.ts';
import { MOTIONS, NO_ROTATION_REASONS, READING_WARNINGS } from '#lib/analysis/reading.ts';

describe('confidenceWords', () => {
  it.each([
    [0.97, 'Very likely right (97 in 100)'],
    [0.95, 'Very likely right (95 in 100)'],
    [0.8, 'Likely right (80 in 100)'],
    [0.5, 'Perhaps right (50 in 100)'],
    [0.31, 'Unsure (31 in 100)'],
  ])('says %f as "%s"', (confidence, words) => {
    expect(confidenceWords(confidence)).toBe(words);
  });

  it('never promises 100 in 100', () => {
    expect(confidenceWords(0.9999)).toBe('Very likely right (99 in 100)');
  });
});

describe('words of a reading', () => {
  it('exist for every motion, reason and warning, each different', () => {
    const all = [
      ...MOTIONS.map((motion) => MOTION_WORDS[motion]),
      ...NO_ROTATION_REASONS.map((reason) => NO_ROTATION_EXPLANATIONS[reason].why),
      ...READING_WARNINGS.map((warning) => WARNING_WORDS[warning]),
    ];
    expect(new Set(all).size).toBe(MOTIONS.length + NO_ROTATION_REASONS.length + READING_WARNINGS.length);
  });
});

describe('warningWords', () => {
  it('says how much of a broken file is usable', () => {
    expect(warningWords('partial', { usableSeconds: 5.12, declaredSeconds: 10.008 })).toBe(
      'The file breaks off: 5.1 of 10.0 s usable.',
    );
  });

  it('says no length that is not known, or not short', () => {
    for (const declaredSeconds of [null, 5]) {
      expect(warningWords('partial', { usableSeconds: 5.12, declaredSeconds })).toBe(WARNING_WORDS.partial);
    }
    expect(warningWords('clipped', { usableSeconds: 5, declaredSeconds: 10 })).toBe(WARNING_WORDS.clipped);
  });
});

describe('failureAdvice', () => {
  it('says what to do about a recording that was not finished', () => {
    expect(failureAdvice('truncated')).toContain('Record again');
  });

  it('has an advice for a code that this page does not know', () => {
    expect(failureAdvice('new-code')).toBe('Analyse it again, or record again.');
  });
});
