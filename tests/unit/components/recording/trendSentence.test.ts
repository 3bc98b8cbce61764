import { describe, expect, it } from 'vitest';
import { trendSentence } from '#components/recording/trendSentence.ts';

describe('trendSentence', () => {
  it('gives the middle nine tenths of a steady run, unmoved by one outlier in 100', () => {
    const speeds = Array.from({ length: 101 }, (_, index) => (index === 50 ? 9000 : 2800 + index));
    expect(trendSentence(speeds, 'steady')).toBe(
      'It ran between 2805 and 2896 rpm all along, followed for 100 % of the time.',
    );
  });

  it('gives one speed when the run stayed within 1 rpm', () => {
    expect(trendSentence([180.1, 179.9, 180], 'steady')).toBe(
      'It ran at 180 rpm all along, followed for 100 % of the time.',
    );
  });

  it('says where a run-up began and ended', () => {
    const speeds = Array.from({ length: 101 }, (_, index) => 1000 + 10 * index);
    expect(trendSentence(speeds, 'varying')).toBe(
      'It went from 1000 to 2000 rpm, between 1050 and 1950 rpm nearly all of the time.',
    );
  });

  it('says how much of the time it turned when it paused', () => {
    expect(trendSentence([1000, null, null, 1000], 'intermittent')).toContain('heard turning for 50 % of the time');
  });

  it('says when nothing could be followed', () => {
    expect(trendSentence([null, null], 'varying')).toBe('At no moment could a turning shaft be followed.');
  });
});
