import { eventPhase, knotSeconds } from './eventTrack.ts';
import type { EventPhase, EventTrack } from './eventTrack.ts';
import type { FrontEnd, SampledSignal } from './frontEnd.ts';
import { WAVEFORM_USABLE_FRACTION } from './frontEnd.ts';
import { smoothestDeviation } from './smoothestDeviation.ts';
import { blockCoherence, demodulateLines } from './lineBlocks.ts';
import type { BlockGrid, LineBlocks } from './lineBlocks.ts';
import { median } from '#lib/statistics/quantiles.ts';

/** One round of the refinement: how far it looks and how fine. */
interface Pass {
  /** Largest relative deviation that is tried, to either side. */
  readonly span: number;
  readonly gridPoints: number;
  /** Length of the sound that one deviation is found from. */
  readonly windowSeconds: number;
  /** Cost of moving by one grid point from one step to the next, squared. */
  readonly stiffness: number;
}

const PASSES: readonly Pass[] = [
  { span: 0.03, gridPoints: 61, windowSeconds: 0.45, stiffness: 0.006 },
  { span: 0.006, gridPoints: 33, windowSeconds: 0.7, stiffness: 0.02 },
  { span: 0.0016, gridPoints: 33, windowSeconds: 1.6, stiffness: 0.01 },
];
/** The last pass averages over so long that only a nearly steady track may use it. */
const STEADY_RANGE = 0.02;
/** A window holds at least this many events. */
const LEAST_WINDOW_EVENTS = 8;
/** Time from one deviation to the next. */
const STEP_SECONDS = 0.2;
/** Longest block, and the phase error in cycles that the farthest deviation may make within one block. */
const LONGEST_BLOCK_SECONDS = 0.05;
const LARGEST_BLOCK_TURN = 0.4;
const WAVEFORM_HARMONICS = 6;
const ENVELOPE_HARMONICS = 8;
/** Lines used, and the weight below which a line is left out relative to the best. */
const MOST_LINES = 10;
const LEAST_RELATIVE_WEIGHT = 0.06;
/** Below this a phone records nothing of the waveform; above the second the envelope rate is too low. */
const LOWEST_WAVEFORM_HZ = 60;
const HIGHEST_ENVELOPE_HZ = 1300;

/** A line of the refined track with its reliability. */
export interface WeightedLine extends LineBlocks {
  /** Weight in sums over lines, ≥ 0: about the power ratio of line to noise in a block. */
  readonly weight: number;
}

/** A track whose phase follows the sound, with the lines that it was fitted to. */
export interface RefinedTrack {
  readonly track: EventTrack;
  readonly phase: EventPhase;
  readonly lines: readonly WeightedLine[];
  readonly grid: BlockGrid;
}

/**
 * Fits a coarse track to the phase of all its harmonics in the waveform and the envelopes at once.
 *
 * Every pass demodulates the lines along the track, finds the small deviation of the rate that makes all of
 * them most coherent at each time, smooths it and corrects the track.
 *
 * References: joint harmonic fit as in M. Christensen & A. Jakobsson (2009), Multi-pitch estimation, chapter 2;
 * J. Nielsen et al. (2017), Fast fundamental frequency estimation, Signal Processing 135.
 */
export function refineTrack(coarse: EventTrack, frontEnd: FrontEnd): RefinedTrack {
  let track = coarse;
  for (const pass of PASSES) {
    if (pass === PASSES.at(-1) && relativeRange(track) > STEADY_RANGE) continue;
    const { lines, grid, phase } = linesAlong(track, frontEnd, pass.span);
    if (lines.length === 0) break;
    track = corrected(track, phase, grid, lines, pass);
  }
  return { track, ...linesAlong(track, frontEnd, PASSES[1]?.span ?? 0) };
}

function linesAlong(track: EventTrack, frontEnd: FrontEnd, span: number): Omit<RefinedTrack, 'track'> {
  const phase = eventPhase(track);
  const medianHz = median(track.eventHz);
  const durationSeconds = frontEnd.waveform.samples.length / frontEnd.waveform.sampleRateHz;
  const blockSeconds = Math.min(LONGEST_BLOCK_SECONDS, LARGEST_BLOCK_TURN / (span * WAVEFORM_HARMONICS * medianHz));
  const cyclesPerBlock = Math.max(1, Math.floor(blockSeconds * medianHz));
  const endCycle =
    (phase.cyclesAtKnot.at(-1) ?? 0) +
    (track.eventHz.at(-1) ?? 0) * (durationSeconds - knotSeconds(track.eventHz.length - 1));
  const grid = {
    firstCycle: 0,
    cyclesPerBlock,
    blockCount: Math.max(1, Math.floor(endCycle / cyclesPerBlock)),
  };
  const highestHz = track.eventHz.reduce((highest, hertz) => Math.max(highest, hertz), 0);
  const lines = sourcesOf(frontEnd).flatMap(({ signal, harmonicCount, lowestHz, limitHz }) => {
    const harmonics = range(harmonicCount).filter(
      (harmonic) => harmonic * medianHz > lowestHz && harmonic * highestHz < limitHz,
    );
    return harmonics.length > 0 ? demodulateLines(signal, phase, grid, { harmonics, medianHz }) : [];
  });
  return { phase, grid, lines: strongestLines(lines) };
}

interface LineSourceLimits {
  readonly signal: SampledSignal;
  readonly harmonicCount: number;
  readonly lowestHz: number;
  readonly limitHz: number;
}

function sourcesOf({ waveform, envelopes }: FrontEnd): LineSourceLimits[] {
  return [
    {
      signal: waveform,
      harmonicCount: WAVEFORM_HARMONICS,
      lowestHz: LOWEST_WAVEFORM_HZ,
      limitHz: WAVEFORM_USABLE_FRACTION * waveform.sampleRateHz,
    },
    ...envelopes.map((signal) => ({
      signal,
      harmonicCount: ENVELOPE_HARMONICS,
      lowestHz: 0,
      limitHz: HIGHEST_ENVELOPE_HZ,
    })),
  ];
}

function range(count: number): number[] {
  return Array.from({ length: count }, (_, index) => index + 1);
}

function strongestLines(lines: readonly LineBlocks[]): WeightedLine[] {
  const weighted = lines.map((line) => {
    const coherence = blockCoherence(line);
    return { ...line, weight: coherence / (1.02 - Math.min(1, coherence)) };
  });
  weighted.sort((a, b) => b.weight - a.weight);
  const least = LEAST_RELATIVE_WEIGHT * (weighted[0]?.weight ?? 0);
  return weighted.slice(0, MOST_LINES).filter((line) => line.weight > least);
}

function corrected(
  track: EventTrack,
  phase: EventPhase,
  grid: BlockGrid,
  lines: readonly WeightedLine[],
  pass: Pass,
): EventTrack {
  const deviation = smoothestDeviation(lines, {
    ...pass,
    windowSeconds: Math.max(pass.windowSeconds, LEAST_WINDOW_EVENTS / median(track.eventHz)),
    stepSeconds: STEP_SECONDS,
    phase,
    grid,
  });
  return {
    ...track,
    eventHz: track.eventHz.map((hertz, knot) => hertz * (1 + deviation(knotSeconds(knot)))),
  };
}

function relativeRange(track: EventTrack): number {
  let low = Infinity;
  let high = 0;
  for (const [knot, hertz] of track.eventHz.entries()) {
    if (!track.isActive[knot]) continue;
    low = Math.min(low, hertz);
    high = Math.max(high, hertz);
  }
  return high > 0 ? high / low - 1 : 0;
}
