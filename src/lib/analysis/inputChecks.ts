import { AnalysisRefused } from './analysisRefused.ts';
import type { ReadingWarning } from './reading.ts';

/** Samples beyond this are no sound: full scale is ±1, and headroom of float files ends far below. */
const LARGEST_SAMPLE = 8;
/** Below this root mean square (−90 dB of full scale, under one step of 16 bits) a channel is silent. */
export const SILENCE_RMS = 3e-5;
/** Below this root mean square (−66 dB of full scale) a warning says that the recording is faint. */
const LOW_LEVEL_RMS = 5e-4;
/** Runs of equal extreme samples are clipping when they make up more than this part of the recording. */
const CLIPPED_FRACTION = 1e-4;
/** How near to its extreme a sample must be to count as clipped. */
const CLIPPED_LEVEL = 0.999;
/** Clipping below this level (a faint float file with flat tops) is left alone. */
const LOWEST_CLIPPING_LEVEL = 0.25;
/** Equal extreme samples in a row that only a limit makes. */
const CLIPPED_RUN = 3;

/** What one channel is like. */
export interface ChannelLevel {
  /** Mean, full scale ±1: a constant offset. */
  readonly offset: number;
  /** Root mean square about the mean. */
  readonly rms: number;
  readonly clippedFraction: number;
}

/**
 * Level of one channel, after checking that it is sound at all.
 *
 * @param samples shape [sampleCount], ≥ 1
 * @throws {AnalysisRefused} `not-finite` for NaN or infinite samples, `out-of-range` beyond ±8 of full scale
 */
export function measureChannel(samples: Float32Array): ChannelLevel {
  let sum = 0;
  let energy = 0;
  let peak = 0;
  for (const value of samples) {
    sum += value;
    energy += value * value;
    if (Math.abs(value) > peak) peak = Math.abs(value);
  }
  if (!Number.isFinite(energy))
    throw new AnalysisRefused('not-finite', 'The recording contains invalid samples: some of them are not numbers.');
  if (peak > LARGEST_SAMPLE) {
    throw new AnalysisRefused('out-of-range', `The sound holds a sample of ${peak.toPrecision(3)} times full scale.`);
  }
  const count = Math.max(1, samples.length);
  const offset = sum / count;
  return {
    offset,
    rms: Math.sqrt(Math.max(0, energy / count - offset * offset)),
    clippedFraction: clippedFraction(samples, peak),
  };
}

/** Part of the samples that lie in runs at the extreme. */
function clippedFraction(samples: Float32Array, peak: number): number {
  if (peak < LOWEST_CLIPPING_LEVEL) return 0;
  const level = CLIPPED_LEVEL * peak;
  let clipped = 0;
  let run = 0;
  for (const value of samples) {
    if (Math.abs(value) >= level) {
      run++;
      if (run === CLIPPED_RUN) clipped += CLIPPED_RUN;
      else if (run > CLIPPED_RUN) clipped++;
    } else {
      run = 0;
    }
  }
  return clipped / samples.length;
}

/** Warnings about the level of the channel or mix that is analysed. */
export function levelWarnings(level: ChannelLevel): ReadingWarning[] {
  const warnings: ReadingWarning[] = [];
  if (level.clippedFraction > CLIPPED_FRACTION) warnings.push('clipped');
  if (level.rms < LOW_LEVEL_RMS) warnings.push('low-level');
  return warnings;
}
