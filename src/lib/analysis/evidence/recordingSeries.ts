import type { FrontEnd, SampledSignal } from '#lib/signal/frontEnd.ts';
import { WAVEFORM_USABLE_FRACTION } from '#lib/signal/frontEnd.ts';
import type { ShaftSearch } from '../findShaft.ts';
import type { RankedHypothesis } from '../rankHypotheses.ts';
import type { Series } from '../series.ts';
import type { AnalysisSettings } from '../settings.ts';
import { oneTurnAverageSeries } from './oneTurnAverageSeries.ts';
import { orderSpectrumSeries } from './orderSpectrumSeries.ts';
import { spectrogramSeries } from './spectrogramSeries.ts';
import { envelopeSpectrumSeries, spectrumSeries } from './spectrumSeries.ts';
import { trendSeries } from './trendSeries.ts';

/** What can be shown of any sound, whether something turns in it or not. */
export function soundSeries(
  { frontEnd, ranked }: ShaftSearch,
  recording: SampledSignal,
  startSeconds: number,
): Series[] {
  const [best] = ranked;
  const usableHz = WAVEFORM_USABLE_FRACTION * frontEnd.waveform.sampleRateHz;
  // Events above the waveform's band are only in the full-rate sound.
  const isHigh = best !== undefined && best.family.trackedHz * best.ratio > usableHz;
  const shown = isHigh ? recording : frontEnd.waveform;
  return [spectrumSeries(shown), envelopeSpectrumSeries(frontEnd.envelopes), spectrogramSeries(shown, startSeconds)];
}

/** What can be shown of a shaft that turns. */
export function rotationSeries(
  frontEnd: FrontEnd,
  { family, ratio }: RankedHypothesis,
  options: {
    readonly settings: AnalysisSettings;
    readonly clockFactor: number;
    readonly uncertainty: number;
    readonly startSeconds: number;
  },
): Series[] {
  const { eventsPerTurn } = options.settings;
  const cyclesPerTurn = eventsPerTurn / ratio;
  return [
    trendSeries(family.refined.track, {
      cyclesPerTurn,
      clockFactor: options.clockFactor,
      relativeUncertainty: options.uncertainty,
      startSeconds: options.startSeconds,
    }),
    orderSpectrumSeries(family.spectra, { cyclesPerTurn, eventsPerTurn }),
    oneTurnAverageSeries(frontEnd, family.refined, cyclesPerTurn),
  ];
}
