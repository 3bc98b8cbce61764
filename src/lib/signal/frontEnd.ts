import { BUTTERWORTH_Q, filterInPlace, highPassBiquad, lowPassBiquad } from './biquad.ts';
import type { Biquad } from './biquad.ts';
import { FAST_NORMALISATION_SECONDS, filteredEnvelope, normalisedEnvelope } from './envelope.ts';
import { LONG_HALF_BAND_PAIRS, SHORT_HALF_BAND_PAIRS, decimateByTwo } from './halfBand.ts';

/** A signal together with its rate. */
export interface SampledSignal {
  readonly samples: Float32Array;
  readonly sampleRateHz: number;
}

/** What the rest of the method listens to. */
export interface FrontEnd {
  /** Low-rate waveform, usable from 20 Hz to `WAVEFORM_USABLE_FRACTION` of its rate. */
  readonly waveform: SampledSignal;
  /** Normalised envelopes of two or three frequency bands, all at one rate near 3 kHz. */
  readonly envelopes: readonly SampledSignal[];
}

/** Highest rate of the low-rate waveform. */
const HIGHEST_WAVEFORM_RATE_HZ = 13_000;
/** What the decimation filters leave flat. */
export const WAVEFORM_USABLE_FRACTION = 0.43;
const RUMBLE_CORNER_HZ = 20;
const ENVELOPE_RATE_HZ = 3000;
/** Borders of the envelope bands. */
const LOW_BAND_HZ = 250;
const MIDDLE_BAND_HZ = 1300;
const HIGH_BAND_HZ = 4200;
/** The top band is only worth having when the recording reaches well above its lower border. */
const LEAST_NYQUIST_FOR_HIGH_BAND_HZ = 6000;
/** Quality factors of a fourth-order Butterworth filter. */
const FOURTH_ORDER_Q = [0.5412, 1.3066] as const;

/**
 * Splits a recording into a low-rate waveform, for tones, and the envelopes of frequency bands, for clicks and
 * for shafts that turn more slowly than a phone can hear.
 *
 * @param samples mono, full scale ±1, shape [sampleCount]; not written
 * @param sampleRateHz [8000, 192000]
 * Reference: envelope analysis as in R. Randall & J. Antoni (2011), Rolling element bearing diagnostics – a
 * tutorial, MSSP 25(2), section 4; rectified instead of squared.
 */
export function createFrontEnd(samples: Float32Array, sampleRateHz: number): FrontEnd {
  const waveform = lowRateWaveform(samples, sampleRateHz);
  const nyquistHz = waveform.sampleRateHz / 2;
  const bands = [
    bandEnvelope(waveform, LOW_BAND_HZ, MIDDLE_BAND_HZ),
    bandEnvelope(waveform, MIDDLE_BAND_HZ, Math.min(HIGH_BAND_HZ, 0.9 * nyquistHz)),
  ];
  if (sampleRateHz / 2 > LEAST_NYQUIST_FOR_HIGH_BAND_HZ) bands.push(highBandEnvelope(samples, sampleRateHz, bands[0]));
  return { waveform, envelopes: bands };
}

function lowRateWaveform(samples: Float32Array, sampleRateHz: number): SampledSignal {
  let rate = sampleRateHz;
  let current = samples;
  while (rate > HIGHEST_WAVEFORM_RATE_HZ) {
    const isLast = rate / 2 <= HIGHEST_WAVEFORM_RATE_HZ;
    current = decimateByTwo(current, isLast ? LONG_HALF_BAND_PAIRS : SHORT_HALF_BAND_PAIRS);
    rate /= 2;
  }
  const rumble = highPassBiquad({
    frequencyHz: RUMBLE_CORNER_HZ,
    sampleRateHz: rate,
    quality: BUTTERWORTH_Q,
  });
  return {
    samples: filterInPlace(current === samples ? current.slice() : current, [rumble]),
    sampleRateHz: rate,
  };
}

function bandEnvelope(waveform: SampledSignal, lowHz: number, highHz: number): SampledSignal {
  const { sampleRateHz } = waveform;
  const sections = [
    highPassBiquad({
      frequencyHz: lowHz,
      sampleRateHz,
      quality: BUTTERWORTH_Q,
    }),
    lowPassBiquad({
      frequencyHz: highHz,
      sampleRateHz,
      quality: BUTTERWORTH_Q,
    }),
  ];
  return envelopeOf(waveform.samples, sampleRateHz, sections, Math.max(1, Math.round(sampleRateHz / ENVELOPE_RATE_HZ)));
}

function highBandEnvelope(
  samples: Float32Array,
  sampleRateHz: number,
  sibling: SampledSignal | undefined,
): SampledSignal {
  const sections = FOURTH_ORDER_Q.map((quality) =>
    highPassBiquad({ frequencyHz: HIGH_BAND_HZ, sampleRateHz, quality }),
  );
  const rateHz = sibling?.sampleRateHz ?? ENVELOPE_RATE_HZ;
  return envelopeOf(samples, sampleRateHz, sections, Math.round(sampleRateHz / rateHz));
}

function envelopeOf(
  samples: Float32Array,
  sampleRateHz: number,
  sections: readonly Biquad[],
  factor: number,
): SampledSignal {
  const envelopeRateHz = sampleRateHz / factor;
  const envelope = filteredEnvelope(samples, sections, factor);
  return {
    samples: normalisedEnvelope(envelope, envelopeRateHz, FAST_NORMALISATION_SECONDS),
    sampleRateHz: envelopeRateHz,
  };
}
