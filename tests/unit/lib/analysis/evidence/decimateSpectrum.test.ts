import { describe, expect, it } from 'vitest';
import { MOST_SPECTRUM_ROWS, decimateSpectrum } from '#lib/analysis/evidence/decimateSpectrum.ts';

describe('decimateSpectrum', () => {
  it('keeps every line at its own place and height when 32,768 bins become 8192 rows', () => {
    const levels = new Float32Array(32_768).map((_, bin) => (bin % 997 === 0 ? 40 + bin / 1000 : -3));
    const { positions, levels: kept } = decimateSpectrum(levels, { step: 0.25, firstBin: 0, endBin: levels.length });
    expect(kept.length).toBeLessThanOrEqual(MOST_SPECTRUM_ROWS);
    for (let bin = 0; bin < levels.length; bin += 997) {
      const row = positions.indexOf(bin * 0.25);
      expect(row).toBeGreaterThanOrEqual(0);
      expect(kept[row]).toBe(levels[bin]);
    }
  });

  it('leaves a short spectrum as it is', () => {
    const { positions, levels } = decimateSpectrum(Float32Array.from([1, 2, 3, 4]), {
      step: 2,
      firstBin: 1,
      endBin: 9,
    });
    expect([...positions]).toEqual([2, 4, 6]);
    expect([...levels]).toEqual([2, 3, 4]);
  });
});
