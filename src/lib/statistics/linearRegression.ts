/** A straight line through points, y ≈ intercept + slope · x. */
export interface RegressionLine {
  readonly slope: number;
  readonly intercept: number;
  /** Sum of squared distances from the line over n − 2; 0 for two points. */
  readonly residualVariance: number;
  /** Sum of squared distances of x from its mean. */
  readonly sumOfSquares: number;
}

/**
 * Least-squares line.
 *
 * @param x shape [n], n ≥ 2, not all equal
 * @param y shape [n]
 * @throws {RangeError} when the shapes differ or x does not vary
 * @example linearRegression([0, 1, 2], [1, 3, 5]).slope // 2
 * Reference: N. Draper & H. Smith (1998), Applied regression analysis, section 1.2.
 */
export function linearRegression(x: ArrayLike<number>, y: ArrayLike<number>): RegressionLine {
  const count = x.length;
  if (y.length !== count)
    throw new RangeError(`linearRegression: x and y must be equally long, got ${count} and ${y.length}`);
  let meanX = 0;
  let meanY = 0;
  for (let index = 0; index < count; index++) {
    meanX += (x[index] as number) / count;
    meanY += (y[index] as number) / count;
  }
  let sumOfSquares = 0;
  let products = 0;
  for (let index = 0; index < count; index++) {
    const dx = (x[index] as number) - meanX;
    sumOfSquares += dx * dx;
    products += dx * ((y[index] as number) - meanY);
  }
  if (!(sumOfSquares > 0)) throw new RangeError('linearRegression: x must hold at least two different values');
  const slope = products / sumOfSquares;
  const intercept = meanY - slope * meanX;
  let residual = 0;
  for (let index = 0; index < count; index++) {
    residual += ((y[index] as number) - intercept - slope * (x[index] as number)) ** 2;
  }
  return {
    slope,
    intercept,
    residualVariance: count > 2 ? residual / (count - 2) : 0,
    sumOfSquares,
  };
}
