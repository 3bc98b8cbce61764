import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { axisPercent, speedAxis, type SpeedAxis } from '#components/session/speedAxis.ts';

const speed = (rpmLow: number, rpmHigh = rpmLow) => ({ rpm: (rpmLow + rpmHigh) / 2, rpmLow, rpmHigh });

function axisOf(...speeds: Parameters<typeof speedAxis>[0]): SpeedAxis {
  const axis = speedAxis(speeds);
  if (axis === null) throw new Error('no axis');
  return axis;
}

describe('speedAxis', () => {
  it('is null without speeds', () => {
    expect(speedAxis([])).toBeNull();
  });

  it('has round ends around 2868–2880 rpm', () => {
    expect(axisOf(speed(2868, 2880))).toEqual({
      minimumRpm: 2865,
      maximumRpm: 2880,
      isLogarithmic: false,
      ticksRpm: [2865, 2870, 2875, 2880],
    });
  });

  it('gives one exact speed room on both sides', () => {
    const axis = axisOf(speed(3000));
    expect(axisPercent(axis, 3000)).toBeGreaterThan(25);
    expect(axisPercent(axis, 3000)).toBeLessThan(75);
  });

  it('is logarithmic from 300 to 20 000 rpm, with ticks of 1, 2 and 5', () => {
    const axis = axisOf(speed(310, 330), speed(19_000, 19_900));
    expect(axis.isLogarithmic).toBe(true);
    expect(axis.ticksRpm).toEqual([200, 500, 1000, 2000, 5000, 10_000, 20_000]);
    // The geometric mean of the ends is the middle of a logarithmic axis.
    expect(axisPercent(axis, Math.sqrt(200 * 20_000))).toBeCloseTo(50, 9);
  });

  it('holds every interval and has 2 to 24 ticks, whatever the speeds', () => {
    const rpm = fc.double({ min: 0.1, max: 1e6, noNaN: true });
    fc.assert(
      fc.property(fc.array(fc.tuple(rpm, rpm), { minLength: 1, maxLength: 30 }), (pairs) => {
        const speeds = pairs.map(([a, b]) => speed(Math.min(a, b), Math.max(a, b)));
        const axis = axisOf(...speeds);
        const slack = 1e-9 * axis.maximumRpm;
        for (const { rpmLow, rpmHigh } of speeds) {
          expect(rpmLow).toBeGreaterThanOrEqual(axis.minimumRpm - slack);
          expect(rpmHigh).toBeLessThanOrEqual(axis.maximumRpm + slack);
        }
        expect(axis.ticksRpm.length).toBeGreaterThanOrEqual(2);
        expect(axis.ticksRpm.length).toBeLessThanOrEqual(24);
      }),
      { seed: 20261201 },
    );
  });
});
