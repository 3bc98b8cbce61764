/** Rounds of clipping: each removes more of the lines from the estimate of what lies between them. */
const CLIPPING_ROUNDS = 2;
/** Nepers of power above the running mean at which a bin is clipped before the next round. */
const CLIPPING_NEPERS = 0.7;

/**
 * Levels above the local noise floor: a running mean of the log spectrum in which lines are clipped.
 *
 * @param logPower natural logarithm of power, shape [binCount]; overwritten
 * @param halfWidthBins reach of the running mean to either side, ≥ 1
 * @returns the same array, nepers of power above the floor. For white Gaussian noise the mean is near 0 and the
 *   values follow the logarithm of an exponential variable (mean −0.577, standard deviation 1.28 about ln of the mean power).
 * References: a clipped-mean detector in the manner of H. Finn & R. Johnson (1968), Adaptive detection mode with
 * threshold control, RCA Review 29, in the log domain.
 */
export function subtractNoiseFloor(logPower: Float32Array, halfWidthBins: number): Float32Array {
  const clipped = Float32Array.from(logPower);
  const floor = new Float32Array(logPower.length);
  slidingMean(logPower, halfWidthBins, floor);
  for (let round = 0; round < CLIPPING_ROUNDS; round++) {
    for (let bin = 0; bin < clipped.length; bin++) {
      clipped[bin] = Math.min(logPower[bin] as number, (floor[bin] as number) + CLIPPING_NEPERS);
    }
    slidingMean(clipped, halfWidthBins, floor);
  }
  for (let bin = 0; bin < logPower.length; bin++) logPower[bin] = (logPower[bin] as number) - (floor[bin] as number);
  return logPower;
}

function slidingMean(values: Float32Array, halfWidth: number, means: Float32Array): void {
  let sum = 0;
  let first = 0;
  let end = 0;
  for (let bin = 0; bin < values.length; bin++) {
    const last = Math.min(values.length - 1, bin + halfWidth);
    while (end <= last) sum += values[end++] as number;
    while (first < bin - halfWidth) sum -= values[first++] as number;
    means[bin] = sum / (end - first);
  }
}
