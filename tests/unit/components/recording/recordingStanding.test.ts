import { describe, expect, it } from 'vitest';
import { isUnsure, recordingName, speedOf, standingOf } from '#components/recording/recordingStanding.ts';
import { readingView, recordingView, reviewView } from '#tests/factories/recordingView.ts';

describe('standingOf', () => {
  it('says a measured speed with its interval and no mark', () => {
    expect(standingOf(recordingView())).toEqual({
      shape: null,
      sentence: '2874 rpm, between 2868 and 2880 (95 %)',
    });
  });

  it.each([
    ['queued', 'waiting', 'Waiting for its analysis'],
    ['working', 'working', 'Being analysed'],
  ] as const)('says that a %s recording is under way', (status, shape, sentence) => {
    expect(standingOf(recordingView({ status, reading: null }))).toEqual({ shape, sentence });
  });

  it('says why an analysis failed in the words of the server', () => {
    const error = { code: 'truncated', message: 'The recording was not finished.' };
    expect(standingOf(recordingView({ status: 'failed', reading: null, error }))).toEqual({
      shape: 'outside',
      sentence: 'The recording was not finished.',
    });
  });

  it('names both speeds of an unsure reading', () => {
    const reading = readingView({ confidence: 0.41 });
    expect(standingOf(recordingView({ reading }))).toEqual({
      shape: 'undecided',
      sentence: 'Unsure: 2874 rpm or 1437 rpm',
    });
  });

  it('says what was heard instead of rotation', () => {
    const reading = readingView({
      status: 'no-rotation',
      motion: 'none',
      rpm: null,
      rpmLow: null,
      rpmHigh: null,
      confidence: null,
      reason: 'hum',
    });
    expect(standingOf(recordingView({ reading })).sentence).toBe('Nothing turning heard: only mains hum');
  });

  it('says who confirmed an unsure reading', () => {
    const recording = recordingView({ reading: readingView({ confidence: 0.41 }), review: reviewView() });
    expect(standingOf(recording).sentence).toBe('2874 rpm, between 2868 and 2880 (95 %); confirmed by Ines Falk');
  });

  it.each([
    ['nothing-turning', 'Nothing turning, a person says'],
    ['record-again', 'To be recorded again'],
  ] as const)('says the decision %s', (decision, sentence) => {
    expect(standingOf(recordingView({ review: reviewView({ decision }) })).sentence).toBe(sentence);
  });
});

describe('speedOf', () => {
  it('takes the speed that a person chose, with the relative width of the measured one', () => {
    const review = reviewView({ decision: 'choose', rpm: 1437 });
    const speed = speedOf(recordingView({ review }));
    expect(speed?.rpm).toBe(1437);
    expect((speed?.rpmHigh ?? 0) / 1437).toBeCloseTo(2880.3 / 2874, 12);
  });

  it.each(['nothing-turning', 'record-again'] as const)('is null after the decision %s', (decision) => {
    expect(speedOf(recordingView({ review: reviewView({ decision }) }))).toBeNull();
  });

  it('is null without a reading', () => {
    expect(speedOf(recordingView({ reading: null }))).toBeNull();
  });
});

describe('isUnsure', () => {
  it.each([
    [0.49, null, true],
    [0.5, null, false],
    [0.49, reviewView(), false],
  ])('with confidence %d', (confidence, review, unsure) => {
    expect(isUnsure({ reading: readingView({ confidence }), review })).toBe(unsure);
  });
});

describe('recordingName', () => {
  it.each([
    [{}, 'Heron, 6 V'],
    [{ build: null }, 'heron.m4a, 6 V'],
    [{ build: null, supplyVolts: null }, 'heron.m4a'],
  ])('of %j', (changes, name) => {
    expect(recordingName(recordingView(changes))).toBe(name);
  });
});
