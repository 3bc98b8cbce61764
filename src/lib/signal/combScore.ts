import { STEPS_PER_NEPER } from './lineMap.ts';
import type { LineMap } from './lineMap.ts';
import type { LineMaps } from './lineMaps.ts';
import { cellOfHertz, cellShift } from './logGrid.ts';

/** Score of every event rate at every time. */
export interface CombScores {
  readonly frameCount: number;
  /** Cell of the lowest event rate that is allowed. */
  readonly firstCell: number;
  /** Number of event rates. */
  readonly cellCount: number;
  /** Shape [frameCount, cellCount], row-major; noise stays near 0, a clear motor reaches 5 to 15. */
  readonly scores: Float32Array;
}

/** Weight of each harmonic of a comb: low ones are surer. */
const HARMONIC_WEIGHTS = [1, 0.95, 0.85, 0.75, 0.65, 0.55, 0.5, 0.45] as const;
/** What lies half way between the teeth counts against the comb. */
const VALLEY_WEIGHT = 0.45;
/** Added to the sum of weights, so that a comb with one tooth in the band is not believed like a whole one. */
const EVENT_WEIGHT_RESERVE = 1.2;
const SHAFT_WEIGHT_RESERVE = 2;
const WAVEFORM_EVENT_WEIGHT = 2;
const ENVELOPE_EVENT_WEIGHT = 2.4;
const WAVEFORM_SHAFT_WEIGHT = 0.825;
const ENVELOPE_SHAFT_WEIGHT = 1.32;
const LOWEST_SCORE = -1;

/**
 * Comb score of event rates: how well lines at the multiples of the event rate, and of the shaft rate below it,
 * stand out, less what stands half way between. It finds the family of a rate; which member of the family is
 * the shaft is decided elsewhere.
 *
 * @param options allowed event rates, Hz, and events per turn; without more than one event a turn the shaft's own comb is the same
 * References: harmonic sum, D. Hermes (1988), Measurement of pitch by subharmonic summation, JASA 83(1); negative
 * valleys, A. Camacho & J. Harris (2008), A sawtooth waveform inspired pitch estimator, JASA 124(3).
 */
export function scoreCombs(
  maps: LineMaps,
  options: {
    readonly lowestEventHz: number;
    readonly highestEventHz: number;
    readonly eventsPerTurn: number;
  },
): CombScores {
  const { frameCount } = maps.waveform;
  const firstCell = cellOfHertz(options.lowestEventHz);
  const endCell = Math.min(maps.waveform.cellCount, cellOfHertz(options.highestEventHz) + 1);
  const cellCount = Math.max(0, endCell - firstCell);
  const scores = new Float32Array(frameCount * cellCount);
  const target = { frameCount, firstCell, cellCount, scores };
  addComb(target, maps.waveform, {
    shift: 0,
    weight: WAVEFORM_EVENT_WEIGHT,
    reserve: EVENT_WEIGHT_RESERVE,
  });
  addComb(target, maps.envelope, {
    shift: 0,
    weight: ENVELOPE_EVENT_WEIGHT,
    reserve: EVENT_WEIGHT_RESERVE,
  });
  if (options.eventsPerTurn > 1) {
    const shift = cellShift(1 / options.eventsPerTurn);
    addComb(target, maps.waveform, {
      shift,
      weight: WAVEFORM_SHAFT_WEIGHT,
      reserve: SHAFT_WEIGHT_RESERVE,
    });
    addComb(target, maps.envelope, {
      shift,
      weight: ENVELOPE_SHAFT_WEIGHT,
      reserve: SHAFT_WEIGHT_RESERVE,
    });
  }
  for (let index = 0; index < scores.length; index++) scores[index] = Math.max(LOWEST_SCORE, scores[index] as number);
  return target;
}

interface Comb {
  /** Cells from the event rate to the fundamental of this comb. */
  readonly shift: number;
  readonly weight: number;
  readonly reserve: number;
}

/** Adds one comb of one map. The grid is logarithmic, so every harmonic is a shift of the whole row. */
function addComb(target: CombScores, map: LineMap, comb: Comb): void {
  const scales = combScales(target, map, comb);
  for (const [index, harmonicWeight] of HARMONIC_WEIGHTS.entries()) {
    const tooth = comb.shift + cellShift(index + 1);
    const valley = comb.shift + cellShift(index + 0.5);
    addShifted(target, map, { shift: tooth, weight: harmonicWeight / STEPS_PER_NEPER, scales });
    addShifted(target, map, {
      shift: valley,
      weight: (-VALLEY_WEIGHT * harmonicWeight) / STEPS_PER_NEPER,
      scales,
    });
  }
}

/** Weight of the comb at each cell, normalised by the teeth that the map covers; shape [cellCount]. */
function combScales(target: CombScores, map: LineMap, comb: Comb): Float32Array {
  const scales = new Float32Array(target.cellCount);
  for (let cell = 0; cell < scales.length; cell++) {
    let covered = comb.reserve;
    for (const [index, harmonicWeight] of HARMONIC_WEIGHTS.entries()) {
      if (map.isCovered[target.firstCell + cell + comb.shift + cellShift(index + 1)]) covered += harmonicWeight;
    }
    scales[cell] = comb.weight / covered;
  }
  return scales;
}

function addShifted(
  target: CombScores,
  map: LineMap,
  {
    shift,
    weight,
    scales,
  }: {
    readonly shift: number;
    readonly weight: number;
    readonly scales: Float32Array;
  },
): void {
  const first = Math.max(0, -(target.firstCell + shift));
  const end = Math.min(target.cellCount, map.cellCount - target.firstCell - shift);
  for (let frame = 0; frame < target.frameCount; frame++) {
    const source = frame * map.cellCount + target.firstCell + shift;
    const row = frame * target.cellCount;
    for (let cell = first; cell < end; cell++) {
      target.scores[row + cell] =
        (target.scores[row + cell] as number) +
        weight * (scales[cell] as number) * (map.strengths[source + cell] as number);
    }
  }
}
