import { describe, expect, it } from 'vitest';
import { fractionFromPpm } from '#lib/units/ratios.ts';

describe('fractionFromPpm', () => {
  // 16.4 ms a minute is 273 ppm.
  it('makes 273 ppm of a minute 16.4 ms', () => {
    expect(fractionFromPpm(273) * 60_000).toBeCloseTo(16.4, 1);
  });
});
