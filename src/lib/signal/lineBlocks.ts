import type { EventPhase } from './eventTrack.ts';
import type { SampledSignal } from './frontEnd.ts';
import { resampleByPhase } from './resampleByPhase.ts';

/** Complex amplitude of one harmonic of the event rate in consecutive blocks of whole events. */
export interface LineBlocks {
  /** Multiple of the event rate. */
  readonly harmonic: number;
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

/** Blocks of a phase axis. */
export interface BlockGrid {
  readonly firstCycle: number;
  /** Whole events in one block, ≥ 1: harmonics then do not leak into each other. */
  readonly cyclesPerBlock: number;
  readonly blockCount: number;
}

/**
 * Demodulates harmonics of the event rate block by block in the angle domain.
 *
 * @param harmonics multiples of the event rate, each below the signal's band limit
 * @param medianHz median event rate, for the density of samples
 * @returns one entry per harmonic, arrays of shape [blockCount]
 */
export function demodulateLines(
  signal: SampledSignal,
  phase: EventPhase,
  grid: BlockGrid,
  options: { readonly harmonics: readonly number[]; readonly medianHz: number },
): LineBlocks[] {
  const perBlock = Math.max(4, Math.ceil((grid.cyclesPerBlock * signal.sampleRateHz) / options.medianHz));
  const resampled = resampleByPhase(signal, phase, {
    firstCycle: grid.firstCycle,
    cyclesPerSample: grid.cyclesPerBlock / perBlock,
    sampleCount: perBlock * grid.blockCount,
  });
  return options.harmonics.map((harmonic) => demodulateLine(resampled, perBlock, grid, harmonic));
}

function demodulateLine(resampled: Float32Array, perBlock: number, grid: BlockGrid, harmonic: number): LineBlocks {
  const cosine = new Float64Array(perBlock);
  const sine = new Float64Array(perBlock);
  for (let sample = 0; sample < perBlock; sample++) {
    const angle = (2 * Math.PI * harmonic * grid.cyclesPerBlock * sample) / perBlock;
    cosine[sample] = Math.cos(angle) / perBlock;
    sine[sample] = Math.sin(angle) / perBlock;
  }
  const real = new Float64Array(grid.blockCount);
  const imaginary = new Float64Array(grid.blockCount);
  for (let block = 0, position = 0; block < grid.blockCount; block++) {
    let sumReal = 0;
    let sumImaginary = 0;
    for (let sample = 0; sample < perBlock; sample++) {
      const value = resampled[position++] as number;
      sumReal += value * (cosine[sample] as number);
      sumImaginary -= value * (sine[sample] as number);
    }
    real[block] = sumReal;
    imaginary[block] = sumImaginary;
  }
  return { harmonic, real, imaginary };
}

/**
 * How far a line keeps its phase from one block to the next, less what noise reaches by chance: 1 for a pure line.
 *
 * @returns coherence in [0, 1]
 */
export function blockCoherence({ real, imaginary }: LineBlocks): number {
  let sumReal = 0;
  let sumImaginary = 0;
  let power = Number.MIN_VALUE;
  for (let block = 1; block < real.length; block++) {
    const [a, b] = [real[block] as number, imaginary[block] as number];
    const [c, d] = [real[block - 1] as number, imaginary[block - 1] as number];
    sumReal += a * c + b * d;
    sumImaginary += b * c - a * d;
    power += (a * a + b * b + c * c + d * d) / 2;
  }
  const chance = Math.min(LARGEST_CHANCE, CHANCE_COHERENCE / Math.sqrt(Math.max(1, real.length - 1)));
  return Math.max(0, Math.hypot(sumReal, sumImaginary) / power - chance);
}

/** Coherence of n blocks of noise stays below this over √n in all but 1 % of cases. */
const CHANCE_COHERENCE = 2.2;
/** With a handful of blocks chance could explain everything; the lines are then judged together, not one by one. */
const LARGEST_CHANCE = 0.6;
