import { describe, expect, it } from 'vitest';
import {
  BUTTERWORTH_Q,
  bandPassBiquad,
  createFilter,
  filterInPlace,
  highPassBiquad,
  lowPassBiquad,
} from '#lib/signal/biquad.ts';
import type { Biquad } from '#lib/signal/biquad.ts';
import { decibelsFromAmplitude } from '#lib/units/decibels.ts';

const sampleRateHz = 8000;

/** Gain at a frequency by the transfer function itself. */
function gainDecibels({ b0, b1, b2, a1, a2 }: Biquad, frequencyHz: number): number {
  const at = (c0: number, c1: number, c2: number) => {
    const angle = (2 * Math.PI * frequencyHz) / sampleRateHz;
    return Math.hypot(
      c0 + c1 * Math.cos(angle) + c2 * Math.cos(2 * angle),
      c1 * Math.sin(angle) + c2 * Math.sin(2 * angle),
    );
  };
  return decibelsFromAmplitude(at(b0, b1, b2) / at(1, a1, a2));
}

describe('highPassBiquad', () => {
  it('is 3.01 dB down at the corner and 12 dB an octave below', () => {
    const section = highPassBiquad({
      frequencyHz: 200,
      sampleRateHz,
      quality: BUTTERWORTH_Q,
    });
    expect(gainDecibels(section, 200)).toBeCloseTo(-3.01, 2);
    expect(gainDecibels(section, 25) - gainDecibels(section, 12.5)).toBeCloseTo(12.04, 1);
    expect(gainDecibels(section, 3500)).toBeCloseTo(0, 2);
  });
});

describe('lowPassBiquad', () => {
  it('is 3.01 dB down at the corner and flat at 0 Hz', () => {
    const section = lowPassBiquad({
      frequencyHz: 200,
      sampleRateHz,
      quality: BUTTERWORTH_Q,
    });
    expect(gainDecibels(section, 200)).toBeCloseTo(-3.01, 2);
    expect(gainDecibels(section, 0)).toBeCloseTo(0, 9);
  });

  it.each([0, 4000, -1, Number.NaN])('refuses a corner at %d Hz of a rate of 8000', (frequencyHz) => {
    expect(() => lowPassBiquad({ frequencyHz, sampleRateHz, quality: 1 })).toThrow(
      'biquad: frequencyHz must be in (0, 4000)',
    );
  });
});

describe('bandPassBiquad', () => {
  it('has unit gain at the centre and is 3 dB down a bandwidth of f/Q apart', () => {
    const section = bandPassBiquad({
      frequencyHz: 500,
      sampleRateHz,
      quality: 10,
    });
    expect(gainDecibels(section, 500)).toBeCloseTo(0, 9);
    // Half-power points of a resonance of quality 10 lie 5 % to either side; warping of the bilinear transform adds little.
    expect(gainDecibels(section, 525.6)).toBeCloseTo(-3, 0);
  });
});

describe('createFilter', () => {
  it('gives the same output in pieces as filterInPlace in one', () => {
    const sections = [
      highPassBiquad({ frequencyHz: 300, sampleRateHz, quality: 2 }),
      lowPassBiquad({ frequencyHz: 900, sampleRateHz, quality: 1 }),
    ];
    const samples = Float64Array.from({ length: 1000 }, (_, n) => Math.sin(0.01 * n * n));
    const whole = filterInPlace(samples.slice(), sections);
    const filter = createFilter(sections);
    for (const [start, end] of [
      [0, 10],
      [10, 700],
      [700, 1000],
    ])
      filter(samples.subarray(start, end));
    expect(samples).toEqual(whole);
  });
});
