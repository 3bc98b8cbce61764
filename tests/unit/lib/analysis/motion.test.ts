import { describe, expect, it } from 'vitest';
import { motionOf, speedSpread } from '#lib/analysis/motion.ts';

function track(rates: readonly (number | null)[]) {
  return {
    eventHz: Float64Array.from(rates, (rate) => rate ?? 100),
    isActive: Uint8Array.from(rates, (rate) => (rate === null ? 0 : 1)),
  };
}

const steady = new Array<number>(30).fill(100);

describe('motionOf', () => {
  it('calls 100 Hz ± 0.3 % steady', () => {
    expect(motionOf(track(steady.map((rate, knot) => rate * (1 + 0.003 * Math.sin(knot)))))).toBe('steady');
  });

  it('calls a run-up from 100 to 130 Hz varying', () => {
    expect(motionOf(track(steady.map((rate, knot) => rate + knot)))).toBe('varying');
  });

  it('calls a stop of a second intermittent, and one of 0.3 s not', () => {
    expect(motionOf(track([...steady, ...new Array<null>(10).fill(null), ...steady]))).toBe('intermittent');
    expect(motionOf(track([...steady, null, null, null, ...steady]))).toBe('steady');
  });

  it('does not call silence before and after a stop', () => {
    expect(motionOf(track([null, null, null, null, null, null, ...steady, null, null, null, null, null]))).toBe(
      'steady',
    );
  });
});

describe('speedSpread', () => {
  it('is the range of the middle 90 % over the median: 0.09 for 0.95 to 1.05 in even steps', () => {
    const rates = Array.from({ length: 101 }, (_, knot) => 95 + knot / 10);
    expect(speedSpread(track(rates))).toBeCloseTo(0.09, 9);
  });
});
