import { describe, expect, it } from 'vitest';
import { waveformSeries } from '#lib/analysis/evidence/waveformSeries.ts';

describe('waveformSeries', () => {
  it('keeps the one click in a hundred thousand samples', () => {
    const samples = new Float32Array(100_000);
    samples[54_321] = 0.9;
    samples[54_322] = -0.8;
    const [time, minimum, maximum] = waveformSeries(samples, 1000, 5).columns;
    expect(maximum?.values.length).toBeLessThanOrEqual(8192);
    expect(Math.max(...(maximum?.values ?? []))).toBeCloseTo(0.9, 6);
    expect(Math.min(...(minimum?.values ?? []))).toBeCloseTo(-0.8, 6);
    const at = maximum?.values.indexOf(Math.max(...maximum.values)) ?? 0;
    // 24 samples to a point: within 0.02 s of 5 + 54.321 s.
    expect(Math.abs((time?.values[at] ?? 0) - 59.321)).toBeLessThan(0.02);
  });
});
