import { median } from '#lib/statistics/quantiles.ts';
import { averageSpectrum } from './averageSpectrum.ts';
import { cyclesAt, longestActiveStretch } from './eventTrack.ts';
import type { EventPhase } from './eventTrack.ts';
import type { FrontEnd, SampledSignal } from './frontEnd.ts';
import { WAVEFORM_USABLE_FRACTION } from './frontEnd.ts';
import { logPower } from './logPower.ts';
import { subtractNoiseFloor } from './noiseFloor.ts';
import { resampleByPhase } from './resampleByPhase.ts';

/** Levels of lines over the order, in multiples of the tracked event rate. */
export interface OrderLevels {
  /** Nepers above the local noise floor, shape [binCount]; bin b stands at order b · `ordersPerBin`. */
  readonly levels: Float32Array;
  readonly ordersPerBin: number;
  /** Bins that one window resolves: above 1 when the sound is shorter than the transform. */
  readonly resolutionBins: number;
  /** Lowest and highest order that the signal carries. */
  readonly lowestOrder: number;
  readonly highestOrder: number;
}

/** Levels of the waveform and the strongest among those of the envelopes. */
export interface OrderSpectra {
  readonly waveform: OrderLevels;
  readonly envelope: OrderLevels;
}

const WAVEFORM_SIZE = 65_536;
const ENVELOPE_SIZE = 16_384;
/** Longest sound used, in windows: the ratio of orders does not become clearer with more. */
const MOST_WINDOWS = 3;
const WAVEFORM_FLOOR_BINS = 60;
const ENVELOPE_FLOOR_BINS = 50;
const LOWEST_WAVEFORM_HZ = 60;
const LOWEST_ENVELOPE_HZ = 0.3;
const HIGHEST_ENVELOPE_HZ = 1250;

/**
 * Order spectra along a track: the sound is resampled at equal angles, so that every shaft-locked line is sharp
 * however the speed moved.
 *
 * @param phase refined phase; only the longest stretch in which events are heard is used
 * Reference: K. Fyfe & E. Munck (1997), Analysis of computed order tracking, MSSP 11(2).
 */
export function orderSpectra(frontEnd: FrontEnd, phase: EventPhase): OrderSpectra {
  const { startSeconds, endSeconds, firstKnot, endKnot } = longestActiveStretch(phase.track);
  const medianHz = median(phase.track.eventHz.subarray(firstKnot, Math.max(firstKnot + 1, endKnot)));
  const stretch = { startSeconds, endSeconds, medianHz };
  const waveform = orderLevels([frontEnd.waveform], phase, stretch, {
    size: WAVEFORM_SIZE,
    floorReachBins: WAVEFORM_FLOOR_BINS,
    lowestHz: LOWEST_WAVEFORM_HZ,
    highestHz: WAVEFORM_USABLE_FRACTION * frontEnd.waveform.sampleRateHz,
  });
  const envelope = orderLevels(frontEnd.envelopes, phase, stretch, {
    size: ENVELOPE_SIZE,
    floorReachBins: ENVELOPE_FLOOR_BINS,
    lowestHz: LOWEST_ENVELOPE_HZ,
    highestHz: HIGHEST_ENVELOPE_HZ,
  });
  return { waveform, envelope };
}

interface Stretch {
  readonly startSeconds: number;
  readonly endSeconds: number;
  readonly medianHz: number;
}

interface LevelOptions {
  readonly size: number;
  readonly floorReachBins: number;
  readonly lowestHz: number;
  readonly highestHz: number;
}

function orderLevels(
  signals: readonly SampledSignal[],
  phase: EventPhase,
  stretch: Stretch,
  options: LevelOptions,
): OrderLevels {
  const rateHz = signals[0]?.sampleRateHz ?? 1;
  const cyclesPerSample = stretch.medianHz / rateHz;
  const longestSeconds = (MOST_WINDOWS * options.size) / rateHz;
  const surplus = Math.max(0, stretch.endSeconds - stretch.startSeconds - longestSeconds) / 2;
  const firstCycle = cyclesAt(phase, stretch.startSeconds + surplus);
  const endCycle = cyclesAt(phase, stretch.endSeconds - surplus);
  const sampleCount = Math.max(2, Math.floor((endCycle - firstCycle) / cyclesPerSample));
  const levels = new Float32Array(options.size / 2 + 1).fill(-Infinity);
  for (const signal of signals) {
    const resampled = resampleByPhase(signal, phase, {
      firstCycle,
      cyclesPerSample,
      sampleCount,
    });
    const { power } = averageSpectrum(resampled, 1, options.size);
    const own = subtractNoiseFloor(logPower(power), options.floorReachBins);
    for (let bin = 0; bin < levels.length; bin++) levels[bin] = Math.max(levels[bin] as number, own[bin] as number);
  }
  return {
    levels,
    ordersPerBin: 1 / (options.size * cyclesPerSample),
    resolutionBins: Math.max(1, options.size / sampleCount),
    lowestOrder: options.lowestHz / stretch.medianHz,
    highestOrder: Math.min(options.highestHz / stretch.medianHz, 0.45 / cyclesPerSample),
  };
}

/** Half-width in bins within which a line is looked for at low orders. */
const LOOK_BINS = 1.2;
/** Half-width relative to the order: the track may be off by this much. */
const LOOK_FRACTION = 4e-4;
/** What the highest of the bins looked at reaches in noise, nepers. */
const NOISE_NEPERS = 1.2;
/** Lines stronger than this weigh no more. */
const STRONGEST_NEPERS = 10;

/**
 * Level of the line at an order, nepers above what noise reaches there.
 *
 * @returns [0, 10]; 0 where there is no line, NaN outside the orders that the signal carries
 */
export function lineLevel(spectrum: OrderLevels, order: number): number {
  if (order < spectrum.lowestOrder || order > spectrum.highestOrder) return Number.NaN;
  const centre = order / spectrum.ordersPerBin;
  const reach = Math.max(LOOK_BINS, LOOK_FRACTION * centre);
  let highest = -Infinity;
  for (
    let bin = Math.max(0, Math.ceil(centre - reach));
    bin <= Math.min(spectrum.levels.length - 1, Math.floor(centre + reach));
    bin++
  ) {
    if ((spectrum.levels[bin] as number) > highest) highest = spectrum.levels[bin] as number;
  }
  return Math.max(0, Math.min(STRONGEST_NEPERS, highest - NOISE_NEPERS));
}
