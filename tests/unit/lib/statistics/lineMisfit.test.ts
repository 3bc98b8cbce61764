import { describe, expect, it } from 'vitest';
import { lineMisfit } from '#lib/statistics/lineMisfit.ts';
import { studentTQuantile } from '#lib/statistics/studentT.ts';

/** F. J. Anscombe (1973), Graphs in statistical analysis, The American Statistician 27, table: data sets 1 and 3. */
const ANSCOMBE_X = [10, 8, 13, 9, 11, 14, 6, 4, 12, 7, 5];
const ANSCOMBE_1_Y = [8.04, 6.95, 7.58, 8.81, 8.33, 9.96, 7.24, 4.26, 10.84, 4.82, 5.68];
const ANSCOMBE_3_Y = [7.46, 6.77, 12.74, 7.11, 7.81, 8.84, 6.08, 5.39, 8.15, 6.42, 5.73];

const allowed = (count: number, allowance: number) => new Array<number>(count).fill(allowance);

describe('lineMisfit', () => {
  it('finds the one point off the line of Anscombe 3, whose residual R calls 1203.5 standard deviations', () => {
    const misfit = lineMisfit({
      x: ANSCOMBE_X,
      y: ANSCOMBE_3_Y,
      allowance: allowed(11, 1e-9),
    });
    expect(misfit?.index).toBe(2);
    const { value = 0, low = 0, high = 0 } = misfit?.expected ?? {};
    // The line of the other ten, by numpy 2.4: 4.00564935 + 0.34538961 x.
    expect(value).toBeCloseTo(8.4957143, 6);
    expect(value - low).toBeCloseTo(high - value, 12);
    const standardDeviation = (high - value) / studentTQuantile(1 - 0.05 / 11, 8);
    expect((12.74 - value) / standardDeviation).toBeCloseTo(1203.539464, 4);
  });

  it('finds none in Anscombe 1, which scatters about its line', () => {
    expect(
      lineMisfit({
        x: ANSCOMBE_X,
        y: ANSCOMBE_1_Y,
        allowance: allowed(11, 1e-9),
      }),
    ).toBeNull();
  });

  it('runs its example', () => {
    expect(
      lineMisfit({
        x: [1, 2, 3, 4],
        y: [2, 4, 3, 8],
        allowance: allowed(4, 0.1),
      })?.index,
    ).toBe(2);
  });

  it('lets a point be off by its allowance of 0.1, not by more', () => {
    const fitOf = (y: number) =>
      lineMisfit({
        x: [1, 2, 3, 4, 5],
        y: [2, 4, 6, 8, y],
        allowance: allowed(5, 0.1),
      });
    expect(fitOf(10.0999)).toBeNull();
    expect(fitOf(10.1001)?.index).toBe(4);
  });

  it('judges nothing with three points, nor a point without which all have one x', () => {
    expect(lineMisfit({ x: [1, 2, 3], y: [1, 9, 3], allowance: allowed(3, 0.1) })).toBeNull();
    expect(
      lineMisfit({
        x: [1, 1, 1, 2],
        y: [3, 3, 3, 99],
        allowance: allowed(4, 0.1),
      }),
    ).toBeNull();
  });

  it('throws for arrays of different lengths', () => {
    expect(() => lineMisfit({ x: [1, 2], y: [1, 2], allowance: [1] })).toThrow(/equally long, got 2, 2 and 1/);
  });
});
