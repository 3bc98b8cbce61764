import type { CombScores } from '#lib/signal/combScore.ts';
import { trackFromCells } from '#lib/signal/eventTrack.ts';
import type { EventTrack } from '#lib/signal/eventTrack.ts';
import type { FrontEnd } from '#lib/signal/frontEnd.ts';
import { cellShift } from '#lib/signal/logGrid.ts';
import { orderSpectra } from '#lib/signal/orderLevels.ts';
import type { OrderSpectra } from '#lib/signal/orderLevels.ts';
import { orderPeaks } from '#lib/signal/orderPeaks.ts';
import type { OrderPeak } from '#lib/signal/orderPeaks.ts';
import { refineTrack } from '#lib/signal/refineTrack.ts';
import type { RefinedTrack } from '#lib/signal/refineTrack.ts';
import { steadyPath, trackPath } from '#lib/signal/trackPath.ts';
import type { TrackPath } from '#lib/signal/trackPath.ts';
import { median } from '#lib/statistics/quantiles.ts';
import { PER_CENT } from '#lib/units/ratios.ts';
import { ratioHypotheses } from './hypotheses.ts';

/** A set of lines that move together: one source of sound, its true rate known up to a ratio. */
export interface SoundFamily {
  readonly path: TrackPath;
  /** Whether the path is the constant fallback because no track was found. */
  readonly isFallback: boolean;
  readonly refined: RefinedTrack;
  readonly spectra: OrderSpectra;
  readonly waveformPeaks: readonly OrderPeak[];
  readonly envelopePeaks: readonly OrderPeak[];
  /** Median tracked rate while heard, Hz. */
  readonly trackedHz: number;
  readonly quality: FamilyQuality;
}

/** How much a family is like one thing that turns. */
export interface FamilyQuality {
  /** Mean comb score along the path. */
  readonly pathScore: number;
  /** Part of the time in which it is heard, [0, 1]. */
  readonly activeFraction: number;
  /** Mean change of the rate's slope from frame to frame, per cent, each counted up to 5: shafts have inertia, voices and tunes have not. */
  readonly restlessness: number;
  /** Sum over the lines of coherent power over noise, on a logarithmic scale: 0 for noise. */
  readonly coherence: number;
}

/** With fewer heard frames than this, absolute and relative, the constant rate with the best mean is taken instead. */
const LEAST_ACTIVE_FRAMES = 5;
const LEAST_ACTIVE_FRACTION = 0.12;
const WAVEFORM_PEAK_NEPERS = 2.6;
const ENVELOPE_PEAK_NEPERS = 2.8;
const MOST_PEAKS = 40;

/**
 * The most plausible family of lines in a recording.
 *
 * @param other a family that was found before: its rate and all ratios of it are avoided
 * @returns null when the combs hold no rate at all
 */
export function findSoundFamily(
  combs: CombScores,
  frontEnd: FrontEnd,
  other: {
    readonly family: SoundFamily;
    readonly eventsPerTurn: number;
  } | null,
): SoundFamily | null {
  if (combs.cellCount === 0) return null;
  const tracked = trackPath(combs, other ? relativesOf(other.family.path, other.eventsPerTurn, combs) : null);
  const least = Math.max(LEAST_ACTIVE_FRAMES, LEAST_ACTIVE_FRACTION * combs.frameCount);
  const isFallback = tracked.activeCount < least;
  if (isFallback && other) return null;
  const path = isFallback ? steadyPath(combs) : tracked;
  const refined = refineTrack(trackFromCells(path.cells), frontEnd);
  const spectra = orderSpectra(frontEnd, refined.phase);
  return {
    path,
    isFallback,
    refined,
    spectra,
    waveformPeaks: orderPeaks(spectra.waveform, {
      leastLevel: WAVEFORM_PEAK_NEPERS,
      most: MOST_PEAKS,
    }),
    envelopePeaks: orderPeaks(spectra.envelope, {
      leastLevel: ENVELOPE_PEAK_NEPERS,
      most: MOST_PEAKS,
    }),
    quality: qualityOf(path, refined),
    trackedHz: median(refined.track.eventHz.filter((_, knot) => refined.track.isActive[knot] === 1)),
  };
}

function qualityOf(path: TrackPath, { lines, track }: RefinedTrack): FamilyQuality {
  return {
    pathScore: path.meanScore,
    activeFraction: path.activeCount / Math.max(1, path.cells.length),
    restlessness: restlessness(track),
    coherence: Math.log1p(lines.reduce((sum, line) => sum + line.weight, 0)),
  };
}

const LARGEST_CHANGE_PERCENT = 5;

function restlessness({ eventHz, isActive }: EventTrack): number {
  let sum = 0;
  let count = 0;
  for (let knot = 2; knot < eventHz.length; knot++) {
    if (!isActive[knot - 2] || !isActive[knot - 1] || !isActive[knot]) continue;
    const [first, middle, last] = [eventHz[knot - 2] as number, eventHz[knot - 1] as number, eventHz[knot] as number];
    sum += Math.min(LARGEST_CHANGE_PERCENT, PER_CENT * Math.abs(Math.log((first * last) / (middle * middle))));
    count++;
  }
  return count > 0 ? sum / count : 0;
}

/** Cells to either side of a relative that are avoided with it. */
const MASK_REACH_CELLS = 3;

function relativesOf(
  path: TrackPath,
  eventsPerTurn: number,
  combs: CombScores,
): (frame: number, cell: number) => boolean {
  const reach = new Uint8Array(2 * combs.cellCount + 1);
  for (const ratio of ratioHypotheses(eventsPerTurn)) {
    const centre = cellShift(ratio) + combs.cellCount;
    reach.fill(1, Math.max(0, centre - MASK_REACH_CELLS), Math.max(0, centre + MASK_REACH_CELLS + 1));
  }
  return (frame, cell) => {
    const own = path.cells[frame] as number;
    return own >= 0 && reach[combs.firstCell + cell - own + combs.cellCount] === 1;
  };
}

/** Mean comb score along a family's path moved by a ratio; 0 where that leaves the allowed range. */
export function pathScoreAt(path: TrackPath, combs: CombScores, ratio: number): number {
  const shift = cellShift(ratio) - combs.firstCell;
  let sum = 0;
  let count = 0;
  for (const [frame, own] of path.cells.entries()) {
    const cell = own + shift;
    if (own < 0 || cell < 0 || cell >= combs.cellCount) continue;
    sum += combs.scores[frame * combs.cellCount + cell] as number;
    count++;
  }
  return count > 0 ? sum / count : 0;
}
