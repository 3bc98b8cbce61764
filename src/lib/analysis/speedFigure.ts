import { cyclesAt, longestActiveStretch } from '#lib/signal/eventTrack.ts';
import { FRAME_SECONDS } from '#lib/signal/lineMap.ts';
import { phaseSlope } from '#lib/signal/phaseSlope.ts';
import type { PhaseSlope } from '#lib/signal/phaseSlope.ts';
import type { RefinedTrack } from '#lib/signal/refineTrack.ts';
import { median, quantile } from '#lib/statistics/quantiles.ts';
import { fractionFromPpm } from '#lib/units/ratios.ts';
import { activeRates, motionOf, speedSpread } from './motion.ts';

/** The one figure of a track, as an event rate. */
export interface SpeedFigure {
  /** Median event rate while heard, Hz. */
  readonly eventHz: number;
  /** Half-width of the 95 % interval below and above, relative to `eventHz`, including the sample clock. */
  readonly relativeBelow: number;
  readonly relativeAbove: number;
}

/** Uncertainty of a phone's sample clock at 95 %: crystals of ±20 to 50 ppm, a few phones far beyond. */
const UNKNOWN_CLOCK_PPM = 100;
/** What remains of it after a correction was measured. */
const CORRECTED_CLOCK_PPM = 10;
/** Wander between segments is not white, so that two standard errors cover too little; found by calibration. */
const COVERAGE_FACTOR = 3.6;
/** Above this ratio of phase scatter to noise the speed really wandered, and a straight line is no longer its phase. */
const WANDER_LIMIT = 2.5;
/** How well the median of a wandering speed is known, in units of its range. */
const WANDER_FRACTION = 0.15;
/** A varying speed's median moves with how much of the start and the end is heard: by this much of the time. */
const MEDIAN_SHIFT = 0.03;

/**
 * Median event rate with its 95 % interval: scatter of the phase, wander, moving speed and the sample clock. It
 * takes for granted that the ratio is right; that is what the confidence is for.
 *
 * @param hasClockCorrection whether the device's clock was measured
 */
export function speedFigure(refined: RefinedTrack, hasClockCorrection: boolean): SpeedFigure {
  const rates = activeRates(refined.track);
  const middle = median(rates);
  const clock = fractionFromPpm(hasClockCorrection ? CORRECTED_CLOCK_PPM : UNKNOWN_CLOCK_PPM);
  const slope = slopeOfLongestStretch(refined);
  if (motionOf(refined.track) === 'steady') {
    const noise = slope ? (COVERAGE_FACTOR * slope.standardErrorHz) / middle : fallbackUncertainty(refined);
    if (
      slope &&
      slope.wanderRatio <= WANDER_LIMIT &&
      Math.abs(slope.eventHz / middle - 1) < speedSpread(refined.track) + clock
    ) {
      return symmetric(slope.eventHz, Math.hypot(noise, clock));
    }
    return symmetric(middle, Math.hypot(noise, clock, WANDER_FRACTION * speedSpread(refined.track)));
  }
  const noise = slope ? slope.standardErrorHz / middle : fallbackUncertainty(refined);
  const shift = MEDIAN_SHIFT;
  return {
    eventHz: middle,
    relativeBelow: Math.hypot(clock, Math.min(noise, LARGEST_MOVING_NOISE), 1 - quantile(rates, 0.5 - shift) / middle),
    relativeAbove: Math.hypot(clock, Math.min(noise, LARGEST_MOVING_NOISE), quantile(rates, 0.5 + shift) / middle - 1),
  };
}

/** The phase of a moving speed is no straight line; its scatter then says little, and counts up to this much. */
const LARGEST_MOVING_NOISE = 1e-3;

function symmetric(eventHz: number, relative: number): SpeedFigure {
  return { eventHz, relativeBelow: relative, relativeAbove: relative };
}

/** Without usable phase: a tenth of the resolution of the whole recording. */
function fallbackUncertainty({ track }: RefinedTrack): number {
  const seconds = activeRates(track).length * FRAME_SECONDS;
  return Math.min(0.01, 0.5 / (median(track.eventHz) * seconds + 1));
}

function slopeOfLongestStretch(refined: RefinedTrack): PhaseSlope | null {
  const { startSeconds, endSeconds } = longestActiveStretch(refined.track);
  const blockAt = (timeSeconds: number) =>
    Math.max(
      0,
      Math.min(refined.grid.blockCount, Math.round(cyclesAt(refined.phase, timeSeconds) / refined.grid.cyclesPerBlock)),
    );
  return phaseSlope(refined, blockAt(startSeconds), blockAt(endSeconds));
}
