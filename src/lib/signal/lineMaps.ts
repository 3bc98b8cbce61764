import type { FrontEnd, SampledSignal } from './frontEnd.ts';
import { WAVEFORM_USABLE_FRACTION } from './frontEnd.ts';
import { decimateByTwo, LONG_HALF_BAND_PAIRS } from './halfBand.ts';
import { addLines, createLineMap, FRAME_SECONDS } from './lineMap.ts';
import type { LineMap } from './lineMap.ts';
import { cellOfHertz } from './logGrid.ts';
import { normalisedEnvelope, SLOW_NORMALISATION_SECONDS } from './envelope.ts';

/** The two views of a recording: lines of the sound itself and lines of its loudness. */
export interface LineMaps {
  readonly waveform: LineMap;
  readonly envelope: LineMap;
}

/** Rates that the slower views are decimated to. */
const SLOW_WAVEFORM_RATE_HZ = 3300;
const SLOW_ENVELOPE_FACTOR = 8;
/** Highest event rate of an envelope at 3 kHz. */
const HIGHEST_ENVELOPE_HZ = 1300;
/** Below this event rate the waveform holds nothing that a phone records. */
const LOWEST_WAVEFORM_HZ = 12;
/** Highest frequency on the grid, Hz, and as a fraction of the sample rate. */
const HIGHEST_CELL_HZ = 14_000;
const HIGHEST_CELL_FRACTION = 0.46;
/** The lowest line that a window resolves has this many periods in it. */
const LEAST_PERIODS = 12;
/** In slow views even few periods must count: a clock ticks five times in five seconds. */
const LEAST_SLOW_PERIODS = 5;

/**
 * Line maps of a recording over all frequencies that the shaft's events could have.
 *
 * @param frontEnd see `createFrontEnd`
 * @param recording the full-rate mono signal, used above the waveform's band
 * @param options `highestEventHz` decides whether the full-rate spectrum is needed, `lowestEventHz` whether the slowest is
 * Reference: pooling of many orders as in Q. Leclère, H. André & J. Antoni (2016), A multi-order probabilistic
 * approach for instantaneous angular speed tracking, MSSP 81.
 */
export function createLineMaps(
  frontEnd: FrontEnd,
  recording: SampledSignal,
  options: { readonly lowestEventHz: number; readonly highestEventHz: number },
): LineMaps {
  const durationSeconds = recording.samples.length / recording.sampleRateHz;
  const frameCount = Math.max(1, Math.floor(durationSeconds / FRAME_SECONDS));
  const highestHz = Math.min(HIGHEST_CELL_HZ, HIGHEST_CELL_FRACTION * recording.sampleRateHz);
  const cellCount = cellOfHertz(highestHz);
  const waveform = createLineMap(frameCount, cellCount);
  const envelope = createLineMap(frameCount, cellCount);
  addWaveformLines(waveform, frontEnd.waveform, recording, options.highestEventHz);
  addEnvelopeLines(envelope, mergedEnvelopes(frontEnd.envelopes), options.lowestEventHz);
  return { waveform, envelope };
}

function addWaveformLines(
  map: LineMap,
  waveform: SampledSignal,
  recording: SampledSignal,
  highestEventHz: number,
): void {
  const usableHz = WAVEFORM_USABLE_FRACTION * waveform.sampleRateHz;
  const shape = {
    signals: [waveform],
    size: 4096,
    hopFrames: 1,
    floorReachBins: 24,
    gain: 1,
  };
  addLines(map, {
    ...shape,
    lowestHz: (LEAST_PERIODS * waveform.sampleRateHz) / shape.size,
    highestHz: usableHz,
  });
  let slow = waveform;
  while (slow.sampleRateHz > SLOW_WAVEFORM_RATE_HZ) {
    slow = {
      samples: decimateByTwo(slow.samples, LONG_HALF_BAND_PAIRS),
      sampleRateHz: slow.sampleRateHz / 2,
    };
  }
  addLines(map, {
    signals: [slow],
    size: 4096,
    hopFrames: 3,
    floorReachBins: 40,
    gain: 1,
    lowestHz: LOWEST_WAVEFORM_HZ,
    highestHz: WAVEFORM_USABLE_FRACTION * slow.sampleRateHz * 0.9,
  });
  if (highestEventHz < usableHz / 2) return;
  addLines(map, {
    signals: [recording],
    size: 4096,
    hopFrames: 2,
    floorReachBins: 24,
    gain: 1,
    lowestHz: usableHz,
    highestHz: HIGHEST_CELL_FRACTION * recording.sampleRateHz,
  });
}

function addEnvelopeLines(map: LineMap, envelopes: readonly SampledSignal[], lowestEventHz: number): void {
  const rateHz = envelopes[0]?.sampleRateHz ?? 1;
  for (const [size, hopFrames, floorReachBins, gain] of [
    [1024, 1, 16, 0.7],
    [4096, 3, 30, 1],
  ] as const) {
    addLines(map, {
      signals: envelopes,
      size,
      hopFrames,
      floorReachBins,
      gain,
      lowestHz: (LEAST_PERIODS * rateHz) / size,
      highestHz: HIGHEST_ENVELOPE_HZ,
    });
  }
  const slow = envelopes.map(slowEnvelope);
  const slowRateHz = rateHz / SLOW_ENVELOPE_FACTOR;
  for (const [size, hopFrames, highestHz] of [
    [512, 3, 30],
    [2048, 6, 30],
    [8192, 12, 8],
  ] as const) {
    const lowestHz = (LEAST_SLOW_PERIODS * slowRateHz) / size;
    const isUsed = size === 512 || lowestEventHz < 2 * ((LEAST_SLOW_PERIODS * slowRateHz * 4) / size);
    if (isUsed)
      addLines(map, {
        signals: slow,
        size,
        hopFrames,
        floorReachBins: 20,
        gain: 1,
        lowestHz,
        highestHz,
      });
  }
}

/** The bands below 4 kHz as one, the band above as another. */
function mergedEnvelopes(envelopes: readonly SampledSignal[]): SampledSignal[] {
  const [low, middle, high] = envelopes;
  if (!low || !middle) return [...envelopes];
  const samples = low.samples.map((value, sample) => (value + (middle.samples[sample] ?? 0)) / 2);
  return high ? [{ samples, sampleRateHz: low.sampleRateHz }, high] : [{ samples, sampleRateHz: low.sampleRateHz }];
}

function slowEnvelope({ samples, sampleRateHz }: SampledSignal): SampledSignal {
  const slow = new Float32Array(Math.floor(samples.length / SLOW_ENVELOPE_FACTOR));
  for (let block = 0; block < slow.length; block++) {
    let sum = 0;
    for (let inside = 0; inside < SLOW_ENVELOPE_FACTOR; inside++)
      sum += (samples[block * SLOW_ENVELOPE_FACTOR + inside] as number) + 1;
    slow[block] = sum / SLOW_ENVELOPE_FACTOR;
  }
  const rateHz = sampleRateHz / SLOW_ENVELOPE_FACTOR;
  return {
    samples: normalisedEnvelope(slow, rateHz, SLOW_NORMALISATION_SECONDS),
    sampleRateHz: rateHz,
  };
}
