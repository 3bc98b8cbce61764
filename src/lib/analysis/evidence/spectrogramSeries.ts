import { fftPlan } from '#lib/signal/fftPlan.ts';
import type { SampledSignal } from '#lib/signal/frontEnd.ts';
import { hannWindow } from '#lib/signal/window.ts';
import { decibelsFromPower } from '#lib/units/decibels.ts';
import type { Series } from '../series.ts';

const MOST_TIMES = 400;
const FREQUENCY_COUNT = 256;
const BINS_PER_ROW = 4;
const SIZE = 2 * FREQUENCY_COUNT * BINS_PER_ROW;
/** Levels are cut off this far below the loudest cell: fainter cells are the noise of the noise. */
const DYNAMIC_RANGE_DECIBELS = 90;

/**
 * Level over time and frequency, dB relative to the loudest cell, [−90, 0]; of each cell the loudest moment and line count.
 *
 * @param signal at least two samples
 * @param startSeconds time of the first sample in the recording
 */
export function spectrogramSeries(signal: SampledSignal, startSeconds: number): Series {
  const { samples, sampleRateHz } = signal;
  const available = Math.max(1, Math.floor((2 * samples.length) / SIZE) - 1);
  const timeCount = Math.min(MOST_TIMES, available);
  const power = new Float32Array(timeCount * FREQUENCY_COUNT);
  for (let segment = 0; segment < available; segment++) {
    const row = Math.floor((segment * timeCount) / available);
    keepLoudest(power.subarray(row * FREQUENCY_COUNT, (row + 1) * FREQUENCY_COUNT), samples, (segment * SIZE) / 2);
  }
  const loudest = power.reduce((highest, value) => Math.max(highest, value), Number.MIN_VALUE);
  const binHz = sampleRateHz / SIZE;
  const duration = samples.length / sampleRateHz;
  return {
    name: 'spectrogram',
    columns: [
      {
        name: 'timeSeconds',
        unit: 's',
        values: Float32Array.from(
          { length: timeCount },
          (_, row) => startSeconds + ((row + 0.5) * duration) / timeCount,
        ),
      },
      {
        name: 'frequencyHz',
        unit: 'Hz',
        values: Float32Array.from({ length: FREQUENCY_COUNT }, (_, row) => (row + 0.5) * BINS_PER_ROW * binHz),
      },
      {
        name: 'levelDecibels',
        unit: 'dB',
        values: power.map((value) => Math.max(-DYNAMIC_RANGE_DECIBELS, decibelsFromPower(value / loudest))),
      },
    ],
  };
}

/** Raises each cell of a row to the loudest of its bins in the segment that starts at `start`. */
function keepLoudest(row: Float32Array, samples: Float32Array, start: number): void {
  const plan = fftPlan(SIZE);
  const window = hannWindow(SIZE);
  for (let sample = 0; sample < SIZE; sample++) {
    plan.input[sample] = (samples[start + sample] ?? 0) * (window[sample] as number);
  }
  const spectrum = plan.transformReal();
  for (let bin = 0; bin < FREQUENCY_COUNT * BINS_PER_ROW; bin++) {
    const power = (spectrum[2 * bin] as number) ** 2 + (spectrum[2 * bin + 1] as number) ** 2;
    const cell = Math.floor(bin / BINS_PER_ROW);
    if (power > (row[cell] as number)) row[cell] = power;
  }
}
