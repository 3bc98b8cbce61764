import { linearRegression } from '#lib/statistics/linearRegression.ts';
import { createSecondsAt } from './eventTrack.ts';
import type { RefinedTrack, WeightedLine } from './refineTrack.ts';

/** The event rate over a stretch as the slope of its phase. */
export interface PhaseSlope {
  /** Slope of the total phase over time by least squares, Hz. */
  readonly eventHz: number;
  /** Standard error of `eventHz` from the scatter of the phase about the line, Hz. */
  readonly standardErrorHz: number;
  /** Scatter of the phase about a straight line, standard deviation in event cycles. */
  readonly scatterCycles: number;
  /** Scatter of the phase about a straight line over what noise alone makes, variance ratio; above 2.5 the speed really wandered. */
  readonly wanderRatio: number;
}

/** Segments of a stretch: long enough for a good phase, many enough for a good line. */
const SHORTEST_SEGMENT_SECONDS = 0.35;
const LEAST_SEGMENT_EVENTS = 5;
const FEWEST_SEGMENTS = 6;
const MOST_SEGMENTS = 16;
/** A line whose segments do not add up to this part of their amplitudes is too weak to unwrap. */
const LEAST_AGREEMENT = 0.5;
/** Segments apart whose second difference measures the noise; Hann segments overlap by half. */
const DIFFERENCE_LAG = 2;
/** Variance of a second difference of independent values with variance 1. */
const SECOND_DIFFERENCE_VARIANCE = 6;
/** Half-overlapping segments share this much: variance of a slope is that of independent ones times 1.5. */
const OVERLAP_VARIANCE = 1.5;

/**
 * Event rate over blocks [firstBlock, endBlock) from the phases of all lines at once.
 *
 * @returns null when no line keeps its phase well enough, or fewer than three segments exist
 * References: S. Tretter (1985), Estimating the frequency of a noisy sinusoid by linear regression, IEEE Trans. IT-31;
 * D. Rife & R. Boorstyn (1974), Single-tone parameter estimation from discrete-time observations, IEEE Trans. IT-20.
 */
export function phaseSlope(refined: RefinedTrack, firstBlock: number, endBlock: number): PhaseSlope | null {
  const { grid, phase, lines } = refined;
  const secondsAt = createSecondsAt(phase);
  const startSeconds = secondsAt(grid.firstCycle + firstBlock * grid.cyclesPerBlock);
  const durationSeconds = secondsAt(grid.firstCycle + endBlock * grid.cyclesPerBlock) - startSeconds;
  const meanHz = ((endBlock - firstBlock) * grid.cyclesPerBlock) / durationSeconds;
  const segmentSeconds = Math.max(SHORTEST_SEGMENT_SECONDS, LEAST_SEGMENT_EVENTS / meanHz);
  const wanted = Math.max(FEWEST_SEGMENTS, Math.min(MOST_SEGMENTS, durationSeconds / segmentSeconds));
  const hop = Math.max(1, Math.floor((endBlock - firstBlock) / (wanted + 1)));
  const centres: number[] = [];
  for (let centre = firstBlock + hop; centre + hop <= endBlock; centre += hop) centres.push(centre);
  if (centres.length < 3) return null;
  const offsets = combinedOffsets(lines, centres, hop);
  if (!offsets) return null;
  const times = new Float64Array(centres.length);
  const phases = new Float64Array(centres.length);
  for (const [index, centre] of centres.entries()) {
    const cycles = grid.firstCycle + centre * grid.cyclesPerBlock;
    times[index] = meanSeconds(
      centre,
      hop,
      (block) => secondsAt(grid.firstCycle + (block + 0.5) * grid.cyclesPerBlock) - startSeconds,
    );
    phases[index] = cycles + (offsets[index] as number);
  }
  return slopeOf(times, phases);
}

function slopeOf(times: Float64Array, phases: Float64Array): PhaseSlope {
  const line = linearRegression(times, phases);
  const residuals = phases.map((phase, index) => phase - line.intercept - line.slope * (times[index] as number));
  const noise = noiseVariance(residuals) ?? line.residualVariance;
  const variance = OVERLAP_VARIANCE * Math.min(line.residualVariance, 2 * noise + Number.MIN_VALUE);
  return {
    eventHz: line.slope,
    standardErrorHz: Math.sqrt(variance / line.sumOfSquares),
    scatterCycles: Math.sqrt(line.residualVariance),
    wanderRatio: line.residualVariance / (noise + Number.MIN_VALUE),
  };
}

/** Variance of the phase noise, free of slow wander; null with too few segments to tell. */
function noiseVariance(phases: Float64Array): number | null {
  let sum = 0;
  let count = 0;
  for (let index = DIFFERENCE_LAG; index + DIFFERENCE_LAG < phases.length; index++) {
    const difference =
      (phases[index - DIFFERENCE_LAG] as number) -
      2 * (phases[index] as number) +
      (phases[index + DIFFERENCE_LAG] as number);
    sum += difference * difference;
    count++;
  }
  return count > 0 ? sum / count / SECOND_DIFFERENCE_VARIANCE : null;
}

/** Phase of all lines relative to the track, event cycles, shape [centres]; null when no line is usable. */
function combinedOffsets(lines: readonly WeightedLine[], centres: readonly number[], hop: number): Float64Array | null {
  const combined = new Float64Array(centres.length);
  let weights = 0;
  for (const line of lines) {
    const offsets = lineOffsets(line, centres, hop);
    if (!offsets) continue;
    const variance = (noiseVariance(offsets) ?? 0) + PHASE_RESOLUTION_CYCLES ** 2;
    for (let index = 0; index < combined.length; index++) {
      combined[index] = (combined[index] as number) + (offsets[index] as number) / variance;
    }
    weights += 1 / variance;
  }
  return weights > 0 ? combined.map((sum) => sum / weights) : null;
}

/** Keeps a noiseless line from having infinite weight. */
const PHASE_RESOLUTION_CYCLES = 1e-7;

/** Unwrapped phase of one line at the segments, event cycles about their mean; null for a line that does not hold. */
function lineOffsets(line: WeightedLine, centres: readonly number[], hop: number): Float64Array | null {
  const offsets = new Float64Array(centres.length);
  let [sumReal, sumImaginary, sumAmplitude, previous] = [0, 0, 0, 0];
  for (const [index, centre] of centres.entries()) {
    const { real, imaginary } = segmentAmplitude(line, centre, hop);
    const angle = Math.atan2(imaginary, real) / (2 * Math.PI);
    const unwrapped = index === 0 ? angle : angle + Math.round(previous - angle);
    offsets[index] = unwrapped;
    previous = unwrapped;
    sumReal += real;
    sumImaginary += imaginary;
    sumAmplitude += Math.hypot(real, imaginary);
  }
  if (Math.hypot(sumReal, sumImaginary) < LEAST_AGREEMENT * sumAmplitude || sumAmplitude === 0) return null;
  const mean = offsets.reduce((sum, offset) => sum + offset, 0) / offsets.length;
  return offsets.map((offset) => (offset - mean) / line.harmonic);
}

/**
 * Time of a segment with the weights that its phase has. Where the track wriggles, the time in the middle is another,
 * and the wriggle would enter the slope.
 */
function meanSeconds(centre: number, hop: number, secondsOf: (block: number) => number): number {
  let sum = 0;
  let weights = 0;
  for (let block = centre - hop; block < centre + hop; block++) {
    const weight = hannWeight(block, centre, hop);
    sum += weight * secondsOf(block);
    weights += weight;
  }
  return sum / weights;
}

function hannWeight(block: number, centre: number, hop: number): number {
  return Math.cos((Math.PI * (block + 0.5 - centre)) / (2 * hop)) ** 2;
}

/** Hann-weighted sum of the blocks within ± hop of a centre. */
function segmentAmplitude(line: WeightedLine, centre: number, hop: number): { real: number; imaginary: number } {
  let real = 0;
  let imaginary = 0;
  for (let block = centre - hop; block < centre + hop; block++) {
    const weight = hannWeight(block, centre, hop);
    real += weight * (line.real[block] ?? 0);
    imaginary += weight * (line.imaginary[block] ?? 0);
  }
  return { real, imaginary };
}
