import { createCellPooling, pooledLevel } from './cellPooling.ts';
import type { CellPooling } from './cellPooling.ts';
import { fftPlan } from './fftPlan.ts';
import type { SampledSignal } from './frontEnd.ts';
import { cellOfHertz } from './logGrid.ts';
import { logPower } from './logPower.ts';
import { subtractNoiseFloor } from './noiseFloor.ts';
import { hannWindow } from './window.ts';

/** Distance of the frames of a line map. */
export const FRAME_SECONDS = 0.1;

/** How far lines stand out of the noise at each time and on each cell of the logarithmic grid. */
export interface LineMap {
  readonly frameCount: number;
  readonly cellCount: number;
  /**
   * Strength above what noise reaches, soft-limited, in steps of 1/`STEPS_PER_NEPER` of a neper: bytes, because ten
   * minutes have twelve million cells. Shape [frameCount, cellCount], row-major.
   */
  readonly strengths: Uint8Array;
  /** Whether any spectrum covers a cell, shape [cellCount]: 1 or 0. */
  readonly isCovered: Uint8Array;
}

/** One kind of spectrum that fills part of a line map. */
export interface LineSource {
  /** One signal, or two of the same rate, of which the stronger line counts. */
  readonly signals: readonly SampledSignal[];
  /** Transform length, a power of two. */
  readonly size: number;
  /** Frames from one spectrum to the next; the frames between repeat it. */
  readonly hopFrames: number;
  readonly lowestHz: number;
  readonly highestHz: number;
  /** Reach of the noise floor's mean to either side. */
  readonly floorReachBins: number;
  readonly gain: number;
}

/** Largest contribution of one source to a cell, so that no single line outweighs a comb. */
const STRONGEST_NEPERS = 2.5;

/** Steps of the stored strength: finer than any evidence, and three full sources fit into a byte. */
export const STEPS_PER_NEPER = 32;
const MOST_STEPS = 255;

/** An empty map. */
export function createLineMap(frameCount: number, cellCount: number): LineMap {
  return {
    frameCount,
    cellCount,
    strengths: new Uint8Array(frameCount * cellCount),
    isCovered: new Uint8Array(cellCount),
  };
}

/** Adds the lines of one source to a map, in place; sources overlap so that long and short windows both have a say. */
export function addLines(map: LineMap, source: LineSource): void {
  const [signal] = source.signals;
  if (!signal || signal.samples.length < 2) return;
  const binHz = signal.sampleRateHz / source.size;
  const highestHz = Math.min(source.highestHz, (source.size / 2 - 2) * binHz);
  const pooling = createCellPooling({
    binHz,
    firstCell: cellOfHertz(source.lowestHz),
    endCell: Math.min(map.cellCount, cellOfHertz(highestHz)),
  });
  map.isCovered.fill(1, pooling.firstCell, pooling.endCell);
  const row = new Float32Array(pooling.endCell - pooling.firstCell);
  for (let frame = 0; frame < map.frameCount; frame += source.hopFrames) {
    const end = Math.min(map.frameCount, frame + source.hopFrames);
    const centreSeconds = ((frame + end) / 2) * FRAME_SECONDS;
    row.fill(0);
    for (const each of source.signals) {
      const levels = subtractNoiseFloor(logSpectrumAt(each, source.size, centreSeconds), source.floorReachBins);
      keepStrongest(row, levels, pooling, source.gain);
    }
    for (let target = frame; target < end; target++) addRow(map, target, pooling.firstCell, row);
  }
}

function keepStrongest(row: Float32Array, levels: Float32Array, pooling: CellPooling, gain: number): void {
  for (let index = 0; index < row.length; index++) {
    const level = gain * (pooledLevel(pooling, levels, index) - (pooling.threshold[index] as number));
    if (level > (row[index] as number)) row[index] = Math.min(STRONGEST_NEPERS, level);
  }
}

function addRow(map: LineMap, frame: number, firstCell: number, row: Float32Array): void {
  const start = frame * map.cellCount + firstCell;
  for (let index = 0; index < row.length; index++) {
    const steps = Math.round(STEPS_PER_NEPER * (row[index] as number));
    map.strengths[start + index] = Math.min(MOST_STEPS, (map.strengths[start + index] as number) + steps);
  }
}

/**
 * Log power spectrum of a Hann-windowed stretch; near the ends of the signal the stretch is moved inside, and a
 * signal shorter than the transform is windowed over its real length.
 */
function logSpectrumAt({ samples, sampleRateHz }: SampledSignal, size: number, centreSeconds: number): Float32Array {
  const plan = fftPlan(size);
  const length = Math.min(size, samples.length);
  const window = hannWindow(length);
  const wanted = Math.round(centreSeconds * sampleRateHz - length / 2);
  const start = Math.max(0, Math.min(samples.length - length, wanted));
  if (length < size) plan.input.fill(0, length);
  for (let sample = 0; sample < length; sample++) {
    plan.input[sample] = (samples[start + sample] as number) * (window[sample] as number);
  }
  const spectrum = plan.transformReal();
  const power = new Float64Array(size / 2 + 1);
  for (let bin = 0; bin < power.length; bin++) {
    const real = spectrum[2 * bin] as number;
    const imaginary = spectrum[2 * bin + 1] as number;
    power[bin] = real * real + imaginary * imaginary;
  }
  return logPower(power);
}
