import { describe, expect, it } from 'vitest';
import { eventHertzFromRpm, hertzFromRpm, rpmFromEventHertz, rpmFromHertz } from '#lib/units/rotation.ts';

describe('rpmFromEventHertz', () => {
  // check-values.json, orders/ripple-rpm: 287.4 Hz at 6, 1, 2, 3 and 12 events a turn.
  it.each([
    [6, 2874],
    [1, 17_244],
    [2, 8622],
    [3, 5748],
    [12, 1437],
  ])('reads 287.4 Hz at %d events a turn as %d rpm', (eventsPerTurn, rpm) => {
    expect(rpmFromEventHertz(287.4, eventsPerTurn)).toBeCloseTo(rpm, 9);
  });

  it('reads one event every second turn at 10 Hz as 1200 rpm', () => {
    expect(rpmFromEventHertz(10, 0.5)).toBe(1200);
  });
});

describe('eventHertzFromRpm', () => {
  // check-values.json, orders/bpf: blade pass of 5 blades at 2400 rpm.
  it('gives 200 Hz for 5 blades at 2400 rpm', () => {
    expect(eventHertzFromRpm(2400, 5)).toBe(200);
  });
});

describe('hertzFromRpm', () => {
  it('is undone by rpmFromHertz', () => {
    expect(rpmFromHertz(hertzFromRpm(331.7))).toBeCloseTo(331.7, 12);
  });
});
