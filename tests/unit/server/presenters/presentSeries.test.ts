import { describe, expect, it } from 'vitest';
import { presentSeries } from '#server/presenters/presentSeries.ts';

describe('presentSeries', () => {
  it('keeps every 32-bit float to within half a unit of its seventh digit, and says gaps as null', () => {
    const values = Float32Array.of(0, 1 / 3, -2874.0625, 1e-20, 3.4e38, Number.NaN, Number.POSITIVE_INFINITY);
    const { columns, units } = presentSeries({
      name: 'trend',
      columns: [{ name: 'shaftSpeedRpm', unit: 'rpm', values }],
    });
    expect(units).toEqual({ shaftSpeedRpm: 'rpm' });
    const given = columns.shaftSpeedRpm ?? [];
    expect(given.slice(5)).toEqual([null, null]);
    given.slice(0, 5).forEach((value, index) => {
      const exact = values[index] ?? Number.NaN;
      expect(Math.abs((value ?? Number.NaN) - exact)).toBeLessThanOrEqual(Math.abs(exact) * 5e-7);
    });
    expect(JSON.stringify(given[1])).toBe('0.3333333');
  });
});
