/** Hum of the mains is as periodic as a shaft; what gives it away is a grid of lines that nothing else lies beside. */
import { isMainsMultiple, mainsGrids } from '#lib/signal/mainsHum.ts';
import type { OrderPeak } from '#lib/signal/orderPeaks.ts';
import { phaseSlope } from '#lib/signal/phaseSlope.ts';
import type { RankedHypothesis } from './rankHypotheses.ts';
import type { SoundFamily } from './soundFamily.ts';

/** Lines that noise does not make, nepers above its floor: the highest of forty noise peaks seldom passes 3.5. */
const CLEAR_NEPERS = 4;
/** A weaker line this near to another one is its skirt, or what a track that is not quite still makes of it. */
const SKIRT_HZ = 1.5;
/** Lines of an envelope this much below its strongest may be aliases. */
const ALIAS_NEPERS = 5;
/** Hum has multiples; a single tone may be anything. */
const FEWEST_LINES = 2;
/** Parts of the lines on the grid: one line of the sound beside it is enough for a motor, an envelope has mixtures too. */
const LEAST_WAVEFORM_SHARE = 0.9;
const LEAST_ENVELOPE_SHARE = 0.8;
/** How far a line of an order spectrum may lie from its multiple: about a bin, and a part of its frequency. */
const TOLERANCE_HZ = 0.1;
const RELATIVE_TOLERANCE = 2e-4;
/** Phase scatter of the event rate about a straight line, cycles: the grid keeps time far better than any motor. */
const STEADY_SCATTER_CYCLES = 0.005;
/** The same for lines so faint that their scatter is noise, and its ratio to noise alone that shows this. */
const FAINT_SCATTER_CYCLES = 0.015;
const STEADY_WANDER_RATIO = 2.5;
/** The lowest six multiples of either mains, and no others, are ever the strongest line of hum. */
const HIGHEST_HUM_HZ = 362;

/**
 * Whether nothing but the mains was found: nearly all clear lines are multiples of 50 or 60 Hz, as steady as a grid.
 *
 * A motor that runs in step with the grid and shows no line of its own is called hum too.
 * Reference: EN 50160 (2010), 4.2.1, on the mains frequency.
 */
export function isHumAlone({ family, ratio }: RankedHypothesis): boolean {
  const waveformLines = withoutSkirts(clearLines(family.waveformPeaks, family));
  const [strongest] = family.envelopePeaks;
  const leastLevel = (strongest?.level ?? 0) - ALIAS_NEPERS;
  const envelopeLines = withoutSkirts(clearLines(family.envelopePeaks, family)).filter(
    ({ level }) => level > leastLevel,
  );
  if (waveformLines.length < FEWEST_LINES || (waveformLines[0]?.frequencyHz ?? 0) > HIGHEST_HUM_HZ) return false;
  if (!isAsSteadyAsMains(family, ratio)) return false;
  return mainsGrids().some(
    (mainsHz) =>
      shareOnGrid(waveformLines, mainsHz) >= LEAST_WAVEFORM_SHARE &&
      shareOnGrid(envelopeLines, mainsHz) >= LEAST_ENVELOPE_SHARE,
  );
}

/**
 * Whether an event rate is a multiple of the mains and as steady: then it is hum, whatever else sounds beside it, or a
 * motor in step with the grid, and the sound cannot tell which.
 */
export function isMainsRate({ family, ratio }: RankedHypothesis): boolean {
  const eventHz = family.trackedHz * ratio;
  if (eventHz > HIGHEST_HUM_HZ) return false;
  const slope = phaseSlope(family.refined, 0, family.refined.grid.blockCount);
  if (!slope || slope.scatterCycles * ratio > STEADY_SCATTER_CYCLES) return false;
  return mainsGrids().some((mainsHz) => isMainsMultiple(mainsHz, eventHz, RELATIVE_TOLERANCE * eventHz));
}

interface ClearLine {
  readonly frequencyHz: number;
  /** Nepers above the noise floor. */
  readonly level: number;
}

function clearLines(peaks: readonly OrderPeak[], { trackedHz }: SoundFamily): ClearLine[] {
  return peaks
    .filter(({ level }) => level >= CLEAR_NEPERS)
    .map(({ order, level }) => ({ frequencyHz: order * trackedHz, level }));
}

/** Strongest first, as the peaks are. */
function withoutSkirts(lines: readonly ClearLine[]): ClearLine[] {
  return lines.filter(
    ({ frequencyHz, level }) =>
      !lines.some((other) => other.level > level && Math.abs(other.frequencyHz - frequencyHz) < SKIRT_HZ),
  );
}

/** 1 when there are no lines at all: nothing speaks against the grid. */
function shareOnGrid(lines: readonly ClearLine[], mainsHz: number): number {
  if (lines.length === 0) return 1;
  const onGrid = lines.filter(({ frequencyHz }) =>
    isMainsMultiple(mainsHz, frequencyHz, TOLERANCE_HZ + RELATIVE_TOLERANCE * frequencyHz),
  );
  return onGrid.length / lines.length;
}

function isAsSteadyAsMains({ refined }: SoundFamily, ratio: number): boolean {
  const slope = phaseSlope(refined, 0, refined.grid.blockCount);
  if (!slope) return true;
  const scatterCycles = slope.scatterCycles * ratio;
  if (scatterCycles <= STEADY_SCATTER_CYCLES) return true;
  return scatterCycles <= FAINT_SCATTER_CYCLES && slope.wanderRatio <= STEADY_WANDER_RATIO;
}
