/** Length of the running mean that an envelope is divided by. */
const NORMALISATION_SECONDS = 1;
/** Part of the overall mean added to the running one, so that silence between sounds is not blown up. */
const MEAN_FLOOR_FRACTION = 0.02;
/** Louder than this many times its surroundings, a knock counts no more. */
const LOUDEST_RATIO = 6;

/** Mean of |samples| over blocks of `factor`; shape [floor(sampleCount / factor)]. */
export function rectifiedDecimation(
  samples: Float32Array,
  factor: number,
): Float32Array {
  const output = new Float32Array(Math.floor(samples.length / factor));
  for (let block = 0, sample = 0; block < output.length; block++) {
    let sum = 0;
    for (let inside = 0; inside < factor; inside++)
      sum += Math.abs(samples[sample++] as number);
    output[block] = sum / factor;
  }
  return output;
}

/**
 * An envelope relative to its surroundings: divided by a running mean, limited, less one. Loud and soft passages,
 * automatic gain and single knocks then weigh alike.
 *
 * @param envelope shape [sampleCount], ≥ 0; overwritten
 * @returns the same array; mean near 0, range [−1, 5]; all −1 … 0 where the input is silent
 */
export function normalisedEnvelope(
  envelope: Float32Array,
  sampleRateHz: number,
): Float32Array {
  const running = runningMean(
    envelope,
    Math.max(1, Math.round((NORMALISATION_SECONDS * sampleRateHz) / 2)),
  );
  let total = 0;
  for (const value of envelope) total += value;
  const floor =
    (MEAN_FLOOR_FRACTION * total) / Math.max(1, envelope.length) +
    Number.MIN_VALUE;
  for (let sample = 0; sample < envelope.length; sample++) {
    const ratio =
      (envelope[sample] as number) / ((running[sample] as number) + floor);
    envelope[sample] = Math.min(LOUDEST_RATIO, ratio) - 1;
  }
  return envelope;
}

/**
 * Mean over the samples within ± `halfWidth` of each one; near the ends over those that exist.
 *
 * @returns a new Float32Array of the same shape
 */
export function runningMean(
  samples: Float32Array,
  halfWidth: number,
): Float32Array {
  const means = new Float32Array(samples.length);
  let sum = 0;
  let first = 0;
  let end = 0;
  for (let sample = 0; sample < samples.length; sample++) {
    for (; end < Math.min(samples.length, sample + halfWidth + 1); end++)
      sum += samples[end] as number;
    for (; first < sample - halfWidth; first++) sum -= samples[first] as number;
    means[sample] = sum / (end - first);
  }
  return means;
}
