import { describe, expect, it } from 'vitest';
import { isHalfPossible, relationOf, whyNotTexts } from '#components/recording/rivals.ts';
import { readingView } from '#tests/factories/recordingView.ts';

describe('relationOf', () => {
  it.each([
    [2874, 'chosen'],
    [2890, 'chosen'],
    [1437, 'half'],
    [5748, 'double'],
    [958, null],
  ])('calls %i rpm %s beside 2874 rpm', (rpm, relation) => {
    expect(relationOf(rpm, 2874)).toBe(relation);
  });
});

describe('whyNotTexts', () => {
  it('weighs half against the chosen speed and says that double is no candidate', () => {
    const candidates = [
      { rpm: 2874, score: 0.91, reason: 'All lines stand out.' },
      { rpm: 1437, score: 0.4, reason: 'Every second line is missing.' },
    ];
    expect(whyNotTexts(readingView({ candidates }), 2874)).toEqual([
      'Half (1437 rpm) weighs 0.40 against 0.91: every second line is missing.',
      'Double (5748 rpm) explains too few lines to be a candidate.',
    ]);
  });

  it('says that half stays possible when it weighs nearly as much', () => {
    const candidates = [
      { rpm: 2874, score: 0.5, reason: 'A.' },
      { rpm: 1437, score: 0.48, reason: 'B.' },
    ];
    expect(whyNotTexts(readingView({ candidates }), 2874)[0]).toContain('stays possible, 0.48 against 0.50');
  });

  it('says that double weighs more when someone looks at the weaker half', () => {
    const candidates = [
      { rpm: 2874, score: 0.91, reason: 'A.' },
      { rpm: 1437, score: 0.4, reason: 'B.' },
    ];
    expect(whyNotTexts(readingView({ candidates }), 1437)[1]).toContain('weighs more, 0.91 against 0.40');
  });

  it('calls a half with a score of 3e-7 as good as ruled out, in its own reason', () => {
    const candidates = [
      { rpm: 2874, score: 0.99, reason: 'A.' },
      {
        rpm: 1437,
        score: 3e-7,
        reason: 'Half the best speed: only some of its events would sound.',
      },
    ];
    expect(whyNotTexts(readingView({ candidates }), 2874)[0]).toBe(
      'Half (1437 rpm) is as good as ruled out: only some of its events would sound.',
    );
  });

  it('says when half lies outside the allowed range', () => {
    const { settings } = readingView();
    const reading = readingView({ settings: { ...settings, rpmMin: 2000 } });
    expect(whyNotTexts(reading, 2874)[0]).toBe('Half (1437 rpm) lies outside the allowed range.');
  });
});

describe('isHalfPossible', () => {
  it.each([
    [0.48, true],
    [0.6, true],
    [0.3, false],
    [0.001, false],
  ])('of a half with a score of %f against 0.5 is %s', (score, isPossible) => {
    const candidates = [
      { rpm: 2874, score: 0.5, reason: '' },
      { rpm: 1437, score, reason: '' },
    ];
    expect(isHalfPossible(readingView({ candidates }), 2874)).toBe(isPossible);
  });

  it('is false when half is no candidate', () => {
    expect(isHalfPossible(readingView({ candidates: [{ rpm: 2874, score: 0.9, reason: '' }] }), 2874)).toBe(false);
  });
});
