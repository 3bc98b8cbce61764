import { createFilter } from './biquad.ts';
import type { Biquad } from './biquad.ts';

/** Samples that are filtered at a time. */
const CHUNK_SAMPLES = 16_384;
/** Length of the running mean that a fast envelope is divided by. */
export const FAST_NORMALISATION_SECONDS = 1;
/** The same for an envelope that shows events of a second and more. */
export const SLOW_NORMALISATION_SECONDS = 3;
/** Part of the overall mean added to the running one, so that silence between sounds is not blown up. */
const MEAN_FLOOR_FRACTION = 0.02;
/** Louder than this many times its surroundings, a knock counts no more. */
const LOUDEST_RATIO = 6;

/**
 * Mean of |filtered samples| over blocks of `factor`. The filtered signal is never held as a whole: at ten minutes
 * it would be larger than everything that comes out.
 *
 * @param samples shape [sampleCount]; not written
 * @param sections filter, run from rest
 * @returns shape [floor(sampleCount / factor)]
 */
export function filteredEnvelope(samples: Float32Array, sections: readonly Biquad[], factor: number): Float32Array {
  const output = new Float32Array(Math.floor(samples.length / factor));
  const filter = createFilter(sections);
  const blocksPerChunk = Math.ceil(CHUNK_SAMPLES / factor);
  const chunk = new Float32Array(blocksPerChunk * factor);
  for (let firstBlock = 0; firstBlock < output.length; firstBlock += blocksPerChunk) {
    const blocks = Math.min(blocksPerChunk, output.length - firstBlock);
    const piece = chunk.subarray(0, blocks * factor);
    piece.set(samples.subarray(firstBlock * factor, (firstBlock + blocks) * factor));
    filter(piece);
    for (let block = 0, sample = 0; block < blocks; block++) {
      let sum = 0;
      for (let inside = 0; inside < factor; inside++) sum += Math.abs(piece[sample++] as number);
      output[firstBlock + block] = sum / factor;
    }
  }
  return output;
}

/**
 * An envelope relative to its surroundings: divided by a running mean, limited, less one. Loud and soft passages,
 * automatic gain and single knocks then weigh alike.
 *
 * @param envelope shape [sampleCount], ≥ 0; overwritten
 * @param meanSeconds length of the running mean, longer than two events
 * @returns the same array; mean near 0, range [−1, 5]; all −1 … 0 where the input is silent
 */
export function normalisedEnvelope(envelope: Float32Array, sampleRateHz: number, meanSeconds: number): Float32Array {
  const running = runningMean(envelope, Math.max(1, Math.round((meanSeconds * sampleRateHz) / 2)));
  let total = 0;
  for (const value of envelope) total += value;
  const floor = (MEAN_FLOOR_FRACTION * total) / Math.max(1, envelope.length) + Number.MIN_VALUE;
  for (let sample = 0; sample < envelope.length; sample++) {
    const ratio = (envelope[sample] as number) / ((running[sample] as number) + floor);
    envelope[sample] = Math.min(LOUDEST_RATIO, ratio) - 1;
  }
  return envelope;
}

/**
 * Mean over the samples within ± `halfWidth` of each one; near the ends over those that exist.
 *
 * @returns a new Float32Array of the same shape
 */
export function runningMean(samples: Float32Array, halfWidth: number): Float32Array {
  const means = new Float32Array(samples.length);
  let sum = 0;
  let first = 0;
  let end = 0;
  for (let sample = 0; sample < samples.length; sample++) {
    for (; end < Math.min(samples.length, sample + halfWidth + 1); end++) sum += samples[end] as number;
    for (; first < sample - halfWidth; first++) sum -= samples[first] as number;
    means[sample] = sum / (end - first);
  }
  return means;
}
