import { logPower } from '#lib/signal/logPower.ts';
import { subtractNoiseFloor } from '#lib/signal/noiseFloor.ts';
import { averageSpectrum } from '#lib/signal/averageSpectrum.ts';
import type { SampledSignal } from '#lib/signal/frontEnd.ts';
import { decibelsFromLogPower } from '#lib/units/decibels.ts';
import type { Series } from '../series.ts';
import { decimateSpectrum } from './decimateSpectrum.ts';

/** Resolution of the drawn spectra: fine enough to part shaft orders, coarse enough to average noise. */
const WAVEFORM_SIZE = 32_768;
const ENVELOPE_SIZE = 8192;
/** Enough averages for a smooth floor; more only cost time. */
const MOST_SEGMENTS = 24;
const FLOOR_REACH_BINS = 60;
/** Below this an envelope spectrum shows only the swelling of the sound. */
const LOWEST_ENVELOPE_HZ = 0.5;
/** What a high-pass at 20 Hz leaves. */
const LOWEST_WAVEFORM_HZ = 10;

/** The spectrum of the sound as stored: level above the local noise floor over frequency. */
export function spectrumSeries(signal: SampledSignal): Series {
  return {
    name: 'spectrum',
    columns: columnsOf([signal], WAVEFORM_SIZE, LOWEST_WAVEFORM_HZ),
  };
}

/** The spectrum of the sound's envelopes, at each frequency that of the band in which the line stands out most. */
export function envelopeSpectrumSeries(envelopes: readonly SampledSignal[]): Series {
  return {
    name: 'envelopeSpectrum',
    columns: columnsOf(envelopes, ENVELOPE_SIZE, LOWEST_ENVELOPE_HZ),
  };
}

function columnsOf(signals: readonly SampledSignal[], size: number, lowestHz: number): Series['columns'] {
  const strongest = new Float32Array(size / 2 + 1).fill(-Infinity);
  let binHz = 1;
  for (const signal of signals) {
    const spectrum = averageSpectrum(signal.samples, signal.sampleRateHz, size, MOST_SEGMENTS);
    const levels = subtractNoiseFloor(logPower(spectrum.power), FLOOR_REACH_BINS);
    for (let bin = 0; bin < levels.length; bin++)
      strongest[bin] = Math.max(strongest[bin] as number, decibelsFromLogPower(levels[bin] as number));
    binHz = spectrum.binHz;
  }
  const rows = decimateSpectrum(strongest, {
    step: binHz,
    firstBin: Math.ceil(lowestHz / binHz),
    endBin: strongest.length,
  });
  return [
    { name: 'frequencyHz', unit: 'Hz', values: rows.positions },
    { name: 'levelDecibels', unit: 'dB', values: rows.levels },
  ];
}
