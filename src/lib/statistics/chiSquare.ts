import { bisect } from './bisect.ts';

/** A term of the series that changes the sum by less is below the precision of a double. */
const NEGLIGIBLE_RATIO = 1e-17;

/**
 * Quantile of the chi-square distribution: the value that stays below it with the given probability.
 *
 * @param probability (0, 1)
 * @param degreesOfFreedom integer ≥ 1
 * @throws {RangeError} for anything else
 * @example chiSquareQuantile(0.95, 10).toFixed(3) // '18.307'
 * Reference: M. Abramowitz & I. Stegun (1972), Handbook of mathematical functions, 26.4.6 (power series).
 */
export function chiSquareQuantile(probability: number, degreesOfFreedom: number): number {
  if (!(probability > 0 && probability < 1)) {
    throw new RangeError(`chiSquareQuantile: probability must be in (0, 1), got ${probability}`);
  }
  if (!Number.isInteger(degreesOfFreedom) || degreesOfFreedom < 1) {
    throw new RangeError(`chiSquareQuantile: degreesOfFreedom must be an integer ≥ 1, got ${degreesOfFreedom}`);
  }
  const excess = (x: number) => distribution(x, degreesOfFreedom) - probability;
  let high = degreesOfFreedom;
  while (excess(high) < 0) high *= 2;
  return bisect(excess, 0, high);
}

/** P(X ≤ x), x > 0: (x/2)^(ν/2) e^(−x/2) / Γ(ν/2 + 1) times 1 + x/(ν+2) + x²/((ν+2)(ν+4)) + … */
function distribution(x: number, degreesOfFreedom: number): number {
  let term = 1;
  let sum = 1;
  for (let order = degreesOfFreedom + 2; term > sum * NEGLIGIBLE_RATIO; order += 2) {
    term *= x / order;
    sum += term;
  }
  const halfDegrees = degreesOfFreedom / 2;
  return Math.exp(halfDegrees * Math.log(x / 2) - x / 2 - logGammaOfHalves(degreesOfFreedom + 2) + Math.log(sum));
}

/** ln Γ(n / 2) by Γ(z + 1) = z Γ(z) from Γ(1) = 1 or Γ(½) = √π. */
function logGammaOfHalves(halfCount: number): number {
  const isEven = halfCount % 2 === 0;
  let sum = isEven ? 0 : Math.log(Math.PI) / 2;
  for (let half = isEven ? 2 : 1; half < halfCount; half += 2) sum += Math.log(half / 2);
  return sum;
}
