import { describe, expect, it } from 'vitest';
import { ratioHypotheses } from '#lib/analysis/hypotheses.ts';

describe('ratioHypotheses', () => {
  it('begins with the tracked rate itself and holds no ratio twice', () => {
    const ratios = ratioHypotheses(6);
    expect(ratios[0]).toBe(1);
    expect(new Set(ratios.map((ratio) => ratio.toFixed(6))).size).toBe(ratios.length);
  });

  it('holds the ratios by which a shaft line is taken for the event line and the other way round', () => {
    for (const eventsPerTurn of [2, 6, 14, 0.5]) {
      const ratios = ratioHypotheses(eventsPerTurn);
      expect(ratios).toContain(eventsPerTurn);
      expect(ratios.some((ratio) => Math.abs(ratio * eventsPerTurn - 1) < 1e-9)).toBe(true);
      expect(ratios).toContain(1 / 2);
      expect(ratios).toContain(2);
    }
  });
});
