import { describe, expect, it } from 'vitest';
import { linearRegression } from '#lib/statistics/linearRegression.ts';

describe('linearRegression', () => {
  // F. Anscombe (1973), Graphs in statistical analysis, first data set: y = 3.00 + 0.500 x, residual sum of squares 13.75 on 9.
  it("fits Anscombe's first data set: slope 0.5001, intercept 3.0001, residual variance 1.529", () => {
    const x = [10, 8, 13, 9, 11, 14, 6, 4, 12, 7, 5];
    const y = [8.04, 6.95, 7.58, 8.81, 8.33, 9.96, 7.24, 4.26, 10.84, 4.82, 5.68];
    const line = linearRegression(x, y);
    expect(line.slope).toBeCloseTo(0.5001, 4);
    expect(line.intercept).toBeCloseTo(3.0001, 4);
    expect(line.residualVariance).toBeCloseTo(13.7627 / 9, 4);
    expect(line.sumOfSquares).toBe(110);
  });

  it('has no residual variance for two points', () => {
    expect(linearRegression([0, 2], [1, 5])).toEqual({
      slope: 2,
      intercept: 1,
      residualVariance: 0,
      sumOfSquares: 2,
    });
  });

  it('refuses shapes that differ and x that does not vary', () => {
    expect(() => linearRegression([1, 2], [1])).toThrow('must be equally long');
    expect(() => linearRegression([1, 1], [1, 2])).toThrow('two different values');
  });
});
