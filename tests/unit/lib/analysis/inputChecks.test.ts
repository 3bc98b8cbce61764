import { describe, expect, it } from 'vitest';
import { AnalysisRefused } from '#lib/analysis/analysisRefused.ts';
import { levelWarnings, measureChannel } from '#lib/analysis/inputChecks.ts';

describe('measureChannel', () => {
  it('measures the offset and the root mean square about it', () => {
    const level = measureChannel(Float32Array.from({ length: 1000 }, (_, n) => 0.25 + (n % 2 === 0 ? 0.1 : -0.1)));
    expect(level.offset).toBeCloseTo(0.25, 6);
    expect(level.rms).toBeCloseTo(0.1, 6);
  });

  it('counts runs of three and more extreme samples as clipped, and single peaks not', () => {
    const sine = (limit: number) =>
      Float32Array.from({ length: 4800 }, (_, n) => Math.max(-limit, Math.min(limit, Math.sin(n / 20))));
    expect(measureChannel(sine(2)).clippedFraction).toBe(0);
    // |sin| > ½ for two thirds of the time.
    expect(measureChannel(sine(0.5)).clippedFraction).toBeGreaterThan(0.6);
  });

  it('accepts 8 times full scale and refuses more', () => {
    expect(measureChannel(Float32Array.from([8, -8])).offset).toBe(0);
    expect(() => measureChannel(Float32Array.from([8.1]))).toThrow(AnalysisRefused);
  });

  it.each([Number.NaN, Infinity, -Infinity])('refuses a sample of %d as not finite', (value) => {
    expect(() => measureChannel(Float32Array.from([0, value]))).toThrow(
      expect.objectContaining({
        code: 'not-finite',
        message: expect.stringContaining('contains invalid samples') as string,
      }) as Error,
    );
  });
});

describe('levelWarnings', () => {
  it('warns of a faint recording below −66 dB of full scale', () => {
    expect(levelWarnings({ offset: 0, rms: 4e-4, clippedFraction: 0 })).toEqual(['low-level']);
    expect(levelWarnings({ offset: 0, rms: 6e-4, clippedFraction: 0 })).toEqual([]);
  });
});
