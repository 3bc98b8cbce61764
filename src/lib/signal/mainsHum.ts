import { averageSpectrum } from './averageSpectrum.ts';
import type { SampledSignal } from './frontEnd.ts';
import type { LineMap } from './lineMap.ts';
import { logPower } from './logPower.ts';
import { cellOfHertz } from './logGrid.ts';
import { subtractNoiseFloor } from './noiseFloor.ts';

/** Hum of the mains that is heard in a recording. */
export interface MainsHum {
  /** Mains frequency as heard, Hz. */
  readonly mainsHz: number;
  /** Multiples of the mains frequency that stand out. */
  readonly harmonics: readonly number[];
}

const NOMINAL_MAINS_HZ = [50, 60] as const;
/** Interconnected grids stay this near to nominal nearly always (EN 50160 allows ten times as much). */
const LARGEST_DEVIATION = 1e-3;
const DEVIATION_STEP = 1e-4;
const MOST_HARMONICS = 14;
const FEWEST_HARMONICS = 4;
const LINE_NEPERS = 3;
const STRONGEST_NEPERS = 8;
const MISSING_PENALTY = 0.5;
const LEAST_SCORE = 22;
const SPECTRUM_SIZE = 65_536;
const FLOOR_REACH_BINS = 60;
const MOST_SEGMENTS = 6;
/** How far a line may lie from its multiple, bins. */
const LOOK_BINS = 1.5;

/**
 * Finds a comb of mains multiples that is steady to the grid.
 *
 * @param waveform low-rate waveform, at least a second of it
 * @returns null when there is no such comb
 * Reference: EN 50160 (2010), 4.2.1, on the mains frequency.
 */
export function detectMainsHum(waveform: SampledSignal): MainsHum | null {
  const { power, binHz } = averageSpectrum(waveform.samples, waveform.sampleRateHz, SPECTRUM_SIZE, MOST_SEGMENTS);
  const levels = subtractNoiseFloor(logPower(power), FLOOR_REACH_BINS);
  const reach = LOOK_BINS * Math.max(1, SPECTRUM_SIZE / waveform.samples.length);
  let best: MainsComb | null = null;
  for (const mainsHz of mainsGrids()) {
    const candidate = mainsComb(levels, mainsHz, binHz, reach);
    const isHum = candidate.harmonics.length >= FEWEST_HARMONICS && candidate.score > LEAST_SCORE;
    if (isHum && candidate.strength > (best?.strength ?? 0)) best = candidate;
  }
  if (!best || countOtherLines(levels, best, binHz, reach) > MOST_OTHER_LINES * best.harmonics.length) return null;
  return { mainsHz: fittedMainsHz(levels, best, binHz, reach), harmonics: best.harmonics };
}

/** Mains frequency through the peaks of all harmonics; high ones tell it more finely. */
function fittedMainsHz(levels: Float32Array, hum: MainsHum, binHz: number, reach: number): number {
  let sum = 0;
  let weights = 0;
  for (const harmonic of hum.harmonics) {
    const centre = (harmonic * hum.mainsHz) / binHz;
    let peak = Math.round(centre);
    for (let bin = Math.ceil(centre - reach); bin <= Math.floor(centre + reach); bin++) {
      if ((levels[bin] ?? -Infinity) > (levels[peak] ?? -Infinity)) peak = bin;
    }
    sum += harmonic * peak * binHz;
    weights += harmonic * harmonic;
  }
  return sum / weights;
}

/** Lines off the mains grid, for each one on it, up to which the grid's lines are hum and no part of a denser comb. */
const MOST_OTHER_LINES = 3;

function countOtherLines(levels: Float32Array, hum: MainsHum, binHz: number, reach: number): number {
  let count = 0;
  const separation = Math.ceil(2 * reach);
  for (let bin = Math.ceil(hum.mainsHz / binHz / 2); bin * binHz < MOST_HARMONICS * hum.mainsHz; bin++) {
    const isLine = (levels[bin] as number) > LINE_NEPERS && highestNear(levels, bin, separation) === levels[bin];
    const multiple = Math.round((bin * binHz) / hum.mainsHz);
    if (isLine && Math.abs(bin - (multiple * hum.mainsHz) / binHz) > separation) count++;
  }
  return count;
}

interface MainsComb extends MainsHum {
  /** Evidence, each line limited. */
  readonly score: number;
  /** Sum of the lines without limit, which is highest where they are met best. */
  readonly strength: number;
}

function mainsComb(levels: Float32Array, mainsHz: number, binHz: number, reach: number): MainsComb {
  const harmonics: number[] = [];
  let score = 0;
  let strength = 0;
  for (let harmonic = 1; harmonic <= MOST_HARMONICS; harmonic++) {
    const level = highestNear(levels, (harmonic * mainsHz) / binHz, reach);
    if (level > LINE_NEPERS) {
      harmonics.push(harmonic);
      strength += level;
      score += Math.min(STRONGEST_NEPERS, level);
    } else {
      score -= MISSING_PENALTY;
    }
  }
  return { mainsHz, harmonics, score, strength };
}

function highestNear(levels: Float32Array, centre: number, reach: number): number {
  let highest = -Infinity;
  for (let bin = Math.ceil(centre - reach); bin <= Math.floor(centre + reach); bin++) {
    highest = Math.max(highest, levels[bin] ?? -Infinity);
  }
  return highest;
}

/** What is left of a line's strength where the mains hums: never nothing, for a motor's line may sit there too. */
const REMAINING_FRACTION = 0.15;

/** Weakens the cells of the mains' multiples in a line map, in place. */
export function weakenMainsHum(map: LineMap, hum: MainsHum): void {
  for (let harmonic = 1; harmonic <= MOST_HARMONICS; harmonic++) {
    const centre = cellOfHertz(harmonic * hum.mainsHz);
    for (let cell = centre - 1; cell <= Math.min(map.cellCount - 1, centre + 1); cell++) {
      for (let frame = 0; frame < map.frameCount; frame++) {
        const index = frame * map.cellCount + cell;
        map.strengths[index] = REMAINING_FRACTION * (map.strengths[index] as number);
      }
    }
  }
}

/** Whether a frequency lies on a multiple of the mains, within the tolerance and what the steps of `mainsGrids` leave. */
export function isMainsMultiple(mainsHz: number, frequencyHz: number, toleranceHz: number): boolean {
  const harmonic = Math.round(frequencyHz / mainsHz);
  return harmonic >= 1 && Math.abs(frequencyHz - harmonic * mainsHz) <= toleranceHz + frequencyHz * DEVIATION_STEP;
}

/** Mains frequencies that occur, Hz: both nominal ones with what grids deviate from them, in fine steps. */
export function mainsGrids(): number[] {
  const stepCount = Math.round(LARGEST_DEVIATION / DEVIATION_STEP);
  return NOMINAL_MAINS_HZ.flatMap((nominalHz) =>
    Array.from({ length: 2 * stepCount + 1 }, (_, step) => nominalHz * (1 + (step - stepCount) * DEVIATION_STEP)),
  );
}
