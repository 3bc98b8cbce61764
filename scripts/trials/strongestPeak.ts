import type { AnalysisSettings } from '#lib/analysis/settings.ts';
import { averageSpectrum } from '#lib/signal/averageSpectrum.ts';
import { eventHertzFromRpm, rpmFromEventHertz } from '#lib/units/rotation.ts';

const SPECTRUM_SIZE = 65_536;

/**
 * The plain method to compare with: the strongest line of the spectrum in the allowed range is the event rate.
 *
 * @returns shaft speed, rpm
 */
export function strongestPeakRpm(samples: Float32Array, sampleRateHz: number, settings: AnalysisSettings): number {
  const { eventsPerTurn, minimumRpm, maximumRpm } = settings;
  const { power, binHz } = averageSpectrum(samples, sampleRateHz, SPECTRUM_SIZE);
  const lowestBin = Math.max(1, Math.ceil(eventHertzFromRpm(minimumRpm, eventsPerTurn) / binHz));
  const highestBin = Math.min(power.length - 2, Math.floor(eventHertzFromRpm(maximumRpm, eventsPerTurn) / binHz));
  let peakBin = lowestBin;
  for (let bin = lowestBin; bin <= highestBin; bin++) {
    if ((power[bin] as number) > (power[peakBin] as number)) peakBin = bin;
  }
  return rpmFromEventHertz(peakBin * binHz, eventsPerTurn);
}
