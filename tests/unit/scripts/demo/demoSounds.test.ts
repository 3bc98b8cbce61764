import { createHash } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { coastDownSpeed, DEMO_MOTORS, steadyWav } from '#scripts/demo/demoSounds.ts';

const coastDown = {
  startRpm: 6200,
  cutSeconds: 1.5,
  constantRpmPerSecond: 500,
  proportionalPerSecond: 0.25,
  durationSeconds: 9,
} as const;

describe('coastDownSpeed', () => {
  it('keeps the speed until the supply is cut', () => {
    const before = coastDownSpeed(coastDown).filter(({ timeSeconds }) => timeSeconds <= 1.5);
    expect(before.every(({ shaftSpeedRpm }) => Math.abs(shaftSpeedRpm - 6200) < 1e-6)).toBe(true);
  });

  it('obeys dn/dt = −(a + b·n) while it turns', () => {
    const points = coastDownSpeed(coastDown).filter((point) => point.timeSeconds > 1.6 && point.shaftSpeedRpm > 100);
    for (const [index, { timeSeconds, shaftSpeedRpm }] of points.entries()) {
      const next = points[index + 1];
      if (!next) continue;
      const slope = (next.shaftSpeedRpm - shaftSpeedRpm) / (next.timeSeconds - timeSeconds);
      const middleRpm = (next.shaftSpeedRpm + shaftSpeedRpm) / 2;
      // The difference over 0.05 s misses the slope by (b·h)²/24 of it, some 7 parts in a million.
      expect(slope / -(500 + 0.25 * middleRpm)).toBeCloseTo(1, 4);
    }
  });

  it('stands still from ln(1 + b·n₀/a)/b after the cut, 7.14 s', () => {
    const points = coastDownSpeed(coastDown);
    const stopSeconds = 1.5 + Math.log(1 + (0.25 * 6200) / 500) / 0.25;
    for (const { timeSeconds, shaftSpeedRpm } of points) expect(shaftSpeedRpm === 0).toBe(timeSeconds > stopSeconds);
  });
});

describe('steadyWav', () => {
  it('makes the same file from the same seed, and another from another', () => {
    const hashOf = (seed: number): string =>
      createHash('sha256')
        .update(steadyWav(seed, DEMO_MOTORS.swift, 2400))
        .digest('hex');
    expect(hashOf(1)).toBe(hashOf(1));
    expect(hashOf(2)).not.toBe(hashOf(1));
  });
});
