import { describe, expect, it } from 'vitest';
import {
  createSecondsAt,
  cyclesAt,
  eventPhase,
  knotSeconds,
  longestActiveStretch,
  trackFromCells,
} from '#lib/signal/eventTrack.ts';
import { cellOfHertz } from '#lib/signal/logGrid.ts';

/** A run-up from 100 to 300 Hz in four seconds. */
const runUp = {
  eventHz: Float64Array.from({ length: 40 }, (_, knot) => 100 + 50 * knotSeconds(knot)),
  isActive: new Uint8Array(40).fill(1),
};

describe('cyclesAt', () => {
  it('integrates a linear run-up exactly: 100 t + 25 t² cycles', () => {
    const phase = eventPhase(runUp);
    // Between the first and the last knot; before the first the rate is taken as constant, 0.05 s at 102.5 instead of 101.25 Hz.
    const before = 0.05 * 1.25;
    for (const time of [0.05, 0.31, 1, 2.77, 3.9]) {
      expect(cyclesAt(phase, time) - before).toBeCloseTo(100 * time + 25 * time ** 2, 9);
    }
  });

  it('carries on at the last rate beyond the end', () => {
    const phase = eventPhase(runUp);
    expect(cyclesAt(phase, 6) - cyclesAt(phase, 5)).toBeCloseTo(100 + 50 * 3.95, 9);
  });
});

describe('createSecondsAt', () => {
  it('inverts cyclesAt within a nanosecond, before, inside and beyond the knots', () => {
    const phase = eventPhase(runUp);
    const secondsAt = createSecondsAt(phase);
    for (const time of [0.01, 0.05, 0.2, 1.234, 3.95, 5]) expect(secondsAt(cyclesAt(phase, time))).toBeCloseTo(time, 9);
  });
});

describe('trackFromCells', () => {
  it('carries the rate over silence and marks it', () => {
    const cell = cellOfHertz(120);
    const track = trackFromCells(Int32Array.from([-1, cell, cell, -1, -1, cell]));
    expect([...track.isActive]).toEqual([0, 1, 1, 0, 0, 1]);
    // The grid is 0.58 % wide.
    for (const hertz of track.eventHz) expect(Math.abs(hertz / 120 - 1)).toBeLessThan(0.003);
  });

  it('takes out a jump of a single frame', () => {
    const cell = cellOfHertz(120);
    const track = trackFromCells(Int32Array.from([cell, cell, cell + 300, cell, cell]));
    expect(Math.abs((track.eventHz[2] as number) / 120 - 1)).toBeLessThan(0.003);
  });

  it('refuses a path that is silent throughout', () => {
    expect(() => trackFromCells(Int32Array.from([-1, -1]))).toThrow('at least one that is not silent');
  });
});

describe('longestActiveStretch', () => {
  it('finds knots 3 to 5 of 0, 1, 0, 1, 1, 0 as 0.3 to 0.5 s', () => {
    const stretch = longestActiveStretch({
      eventHz: new Float64Array(6).fill(1),
      isActive: Uint8Array.from([0, 1, 0, 1, 1, 0]),
    });
    expect([stretch.firstKnot, stretch.endKnot]).toEqual([3, 5]);
    expect(stretch.startSeconds).toBeCloseTo(0.3, 12);
    expect(stretch.endSeconds).toBeCloseTo(0.5, 12);
  });
});
