import { describe, expect, it } from 'vitest';
import { averageSpectrum } from '#lib/signal/averageSpectrum.ts';
import { commutatorSound, twoContactSound } from '#lib/signal/synthesis/motorSounds.ts';
import { TRUTH_STEP_SECONDS, synthesiseMotor } from '#lib/signal/synthesis/synthesiseMotor.ts';

const sampleRateHz = 16_000;
const steady = { durationSeconds: 4, sampleRateHz, speed: [{ timeSeconds: 0, shaftSpeedRpm: 3000 }] };

describe('synthesiseMotor', () => {
  it('repeats itself sample by sample for the same seed, and differs for another', () => {
    const options = { ...steady, noise: { colour: 'pink', levelDecibels: -40 } as const, ...twoContactSound() };
    expect(synthesiseMotor({ ...options, seed: 1 }).samples).toEqual(synthesiseMotor({ ...options, seed: 1 }).samples);
    expect(synthesiseMotor({ ...options, seed: 1 }).samples).not.toEqual(
      synthesiseMotor({ ...options, seed: 2 }).samples,
    );
  });

  it('puts the ripple of 6 a turn at 300 Hz for 3000 rpm', () => {
    const { samples } = synthesiseMotor({ ...steady, seed: 3, ...commutatorSound(6) });
    const { power, binHz } = averageSpectrum(samples, sampleRateHz, 16_384);
    expect(Math.abs(power.indexOf(Math.max(...power)) * binHz - 300)).toBeLessThan(binHz);
  });

  it('makes 200 clicks in 4 s for two contacts at 1500 rpm', () => {
    const [contacts] = twoContactSound(0).contacts ?? [];
    if (!contacts) throw new Error('two contacts expected');
    const { samples } = synthesiseMotor({
      ...steady,
      seed: 4,
      speed: [{ timeSeconds: 0, shaftSpeedRpm: 1500 }],
      contacts: [{ ...contacts, jitter: 0, resonances: [{ frequencyHz: 3000, quality: 3, gain: 1 }] }],
    });
    // One click every 320 samples; each dies away within 40.
    let clicks = 0;
    let quietSince = 0;
    for (const [sample, value] of samples.entries()) {
      if (Math.abs(value) < 0.05) continue;
      if (sample - quietSince > 100) clicks++;
      quietSince = sample;
    }
    expect(Math.abs(clicks - 200)).toBeLessThanOrEqual(1);
  });

  it('tells the truth about a run-up from 0 to 6000 rpm', () => {
    const { truth } = synthesiseMotor({
      ...steady,
      seed: 5,
      speed: [
        { timeSeconds: 0, shaftSpeedRpm: 0 },
        { timeSeconds: 4, shaftSpeedRpm: 6000 },
      ],
    });
    for (const [point, rpm] of truth.shaftSpeedRpm.entries())
      expect(rpm).toBeCloseTo(1500 * point * TRUTH_STEP_SECONDS, 1);
  });

  it('wanders by the asked root mean square of 1 % within a third', () => {
    const { truth } = synthesiseMotor({
      ...steady,
      seed: 6,
      durationSeconds: 60,
      sampleRateHz: 8000,
      wanderFraction: 0.01,
    });
    const deviations = Array.from(truth.shaftSpeedRpm, (rpm) => rpm / 3000 - 1);
    const rootMeanSquare = Math.sqrt(deviations.reduce((sum, value) => sum + value ** 2, 0) / deviations.length);
    // 60 s hold some 40 independent stretches of 1.6 s: 11 % standard error.
    expect(rootMeanSquare).toBeGreaterThan(0.0067);
    expect(rootMeanSquare).toBeLessThan(0.0133);
  });

  it('clips at full scale', () => {
    const { samples } = synthesiseMotor({
      ...steady,
      seed: 7,
      ...commutatorSound(6),
      phone: { highPassHz: 100, gain: 30, hasAutomaticGain: false },
    });
    expect(Math.max(...samples)).toBe(1);
    expect(Math.min(...samples)).toBe(-1);
  });
});
