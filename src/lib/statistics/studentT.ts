import { bisect } from './bisect.ts';

/**
 * Two-sided quantile of Student's t distribution: |T| stays below it with the given probability.
 *
 * @param probability (0, 1), e.g. 0.95
 * @param degreesOfFreedom integer ≥ 1
 * @throws {RangeError} for anything else
 * @example studentTQuantile(0.95, 4).toFixed(3) // '2.776'
 * Reference: M. Abramowitz & I. Stegun (1972), Handbook of mathematical functions, 26.7.3 and 26.7.4: with
 * θ = arctan(t / √ν), P(|T| < t) is a finite sum of powers of cos θ. Solved for θ, which is bounded, not for t.
 */
export function studentTQuantile(probability: number, degreesOfFreedom: number): number {
  if (!(probability > 0 && probability < 1)) {
    throw new RangeError(`studentTQuantile: probability must be in (0, 1), got ${probability}`);
  }
  if (!Number.isInteger(degreesOfFreedom) || degreesOfFreedom < 1) {
    throw new RangeError(`studentTQuantile: degreesOfFreedom must be an integer ≥ 1, got ${degreesOfFreedom}`);
  }
  const excess = (theta: number) => coverage(theta, degreesOfFreedom) - probability;
  return Math.tan(bisect(excess, 0, Math.PI / 2)) * Math.sqrt(degreesOfFreedom);
}

/** P(|T| < √ν · tan θ). */
function coverage(theta: number, degreesOfFreedom: number): number {
  const isOdd = degreesOfFreedom % 2 === 1;
  const squaredCosine = Math.cos(theta) ** 2;
  let term = isOdd ? Math.cos(theta) : 1;
  let sum = degreesOfFreedom === 1 ? 0 : term;
  for (let order = isOdd ? 3 : 2; order < degreesOfFreedom; order += 2) {
    term *= (squaredCosine * (order - 1)) / order;
    sum += term;
  }
  return isOdd ? (2 / Math.PI) * (theta + Math.sin(theta) * sum) : Math.sin(theta) * sum;
}
