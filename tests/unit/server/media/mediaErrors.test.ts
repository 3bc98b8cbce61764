import { describe, expect, it } from 'vitest';
import { tooLongMessage, tooShortMessage, unsupportedRateMessage } from '#server/media/mediaErrors.ts';

describe('tooLongMessage', () => {
  it.each([
    [14_400, '4 h 0 min'],
    [3600, '1 h 0 min'],
    [3599, '59 min 59 s'],
    [600.01, '10 min 1 s'],
    [null, 'more than 10 min'],
  ])('says %s s as "%s; limit 10 min"', (durationSeconds, length) => {
    expect(tooLongMessage(durationSeconds)).toContain(`Too long: ${length}; limit 10 min.`);
  });
});

describe('tooShortMessage', () => {
  it('says 0.04 s as "0.0 s; at least 0.5 s needed"', () => {
    expect(tooShortMessage(0.04)).toContain('Too short: 0.0 s; at least 0.5 s needed.');
  });

  it('never rounds a length up to the one that is needed', () => {
    expect(tooShortMessage(0.48)).toContain('Too short: 0.4 s;');
  });
});

describe('unsupportedRateMessage', () => {
  it('names rate and range', () => {
    expect(unsupportedRateMessage(1)).toContain('1 Hz; 8 to 192 kHz');
  });
});
