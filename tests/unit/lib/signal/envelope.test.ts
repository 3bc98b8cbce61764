import { describe, expect, it } from 'vitest';
import { filteredEnvelope, normalisedEnvelope, runningMean } from '#lib/signal/envelope.ts';
import { BUTTERWORTH_Q, filterInPlace, highPassBiquad } from '#lib/signal/biquad.ts';

describe('runningMean', () => {
  it('averages over those neighbours that exist', () => {
    expect([...runningMean(Float32Array.from([3, 0, 0, 6, 0]), 1)]).toEqual([1.5, 1, 2, 2, 3]);
  });
});

describe('normalisedEnvelope', () => {
  it('makes loud and soft passages alike', () => {
    const envelope = Float32Array.from({ length: 4000 }, (_, n) => (n < 2000 ? 0.01 : 1) * (1 + Math.cos(n)));
    const normalised = normalisedEnvelope(envelope, 100, 1);
    const power = (part: Float32Array) => part.reduce((sum, value) => sum + value * value, 0) / part.length;
    // The floor of 2 % of the overall mean halves a passage that is a hundredth as loud.
    expect(power(normalised.subarray(200, 1800)) / power(normalised.subarray(2200, 3800))).toBeGreaterThan(0.2);
  });

  it('limits a knock to 5 and turns silence into −1', () => {
    const envelope = new Float32Array(1000);
    envelope[500] = 9;
    const normalised = normalisedEnvelope(envelope, 100, 1);
    expect(normalised[500]).toBe(5);
    expect(normalised[0]).toBe(-1);
  });

  it('stays finite when everything is silent', () => {
    expect(normalisedEnvelope(new Float32Array(100), 100, 1).every((value) => Number.isFinite(value))).toBe(true);
  });
});

describe('filteredEnvelope', () => {
  it('is the block mean of the rectified filtered signal, across its chunks', () => {
    const samples = Float32Array.from({ length: 40_000 }, (_, n) => Math.sin(n * 0.3) + 0.2 * Math.sin(n * 0.01));
    const sections = [highPassBiquad({ frequencyHz: 500, sampleRateHz: 48_000, quality: BUTTERWORTH_Q })];
    const filtered = filterInPlace(samples.slice(), sections);
    const envelope = filteredEnvelope(samples, sections, 16);
    expect(envelope).toHaveLength(2500);
    for (const block of [0, 1023, 1024, 2499]) {
      const mean = filtered.subarray(16 * block, 16 * block + 16).reduce((sum, value) => sum + Math.abs(value), 0) / 16;
      expect(envelope[block]).toBeCloseTo(mean, 6);
    }
  });
});
