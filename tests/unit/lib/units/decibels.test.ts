import { describe, expect, it } from 'vitest';
import {
  amplitudeFromDecibels,
  decibelsFromAmplitude,
  decibelsFromLogPower,
  decibelsFromPower,
  powerFromDecibels,
} from '#lib/units/decibels.ts';

describe('amplitudeFromDecibels', () => {
  // EBU R 68 and SMPTE RP 155 alignment levels (check-values.json, tones/ref-tones).
  it.each([
    [-18, 0.12589254117941673],
    [-20, 0.1],
    [0, 1],
  ])('gives the amplitude of %d dB', (level, amplitude) => {
    expect(amplitudeFromDecibels(level)).toBeCloseTo(amplitude, 12);
  });

  it('is undone by decibelsFromAmplitude', () => {
    expect(decibelsFromAmplitude(amplitudeFromDecibels(-37.5))).toBeCloseTo(-37.5, 10);
  });
});

describe('powerFromDecibels', () => {
  it('gives a power of 100 for 20 dB and is undone by decibelsFromPower', () => {
    expect(powerFromDecibels(20)).toBeCloseTo(100, 10);
    expect(decibelsFromPower(powerFromDecibels(3))).toBeCloseTo(3, 10);
  });
});

describe('decibelsFromLogPower', () => {
  // Standard deviation of the logarithm of an exponential variable, π/√6 nepers of power, is 5.57 dB.
  it('turns π/√6 nepers into 5.57 dB', () => {
    expect(decibelsFromLogPower(Math.PI / Math.sqrt(6))).toBeCloseTo(5.57, 2);
  });
});
