/** The evidence that a reading carries. Which of them exist depends on the engine. */
export const SERIES_NAMES = [
  'spectrum',
  'envelopeSpectrum',
  'orderSpectrum',
  'spectrogram',
  'oneTurnAverage',
  'trend',
  'waveform',
] as const;
export type SeriesName = (typeof SERIES_NAMES)[number];

/** One column of numbers; NaN marks a gap. */
export interface SeriesColumn {
  /** camelCase with the dimension in it: `frequencyHz`, `levelDecibels`, `timeSeconds`, `shaftSpeedRpm`. */
  readonly name: string;
  /** Unit as people write it: `Hz`, `dB`, `s`, `rpm`, `1` for a ratio or count. */
  readonly unit: string;
  readonly values: Float32Array;
}

/**
 * A named set of columns.
 *
 * spectrum, envelopeSpectrum: frequencyHz, levelDecibels (above the local noise floor), equal length, ascending.
 * orderSpectrum: order (multiples of the shaft rate), levelDecibels.
 * trend: timeSeconds, shaftSpeedRpm, lowRpm, highRpm; NaN where nothing turns or is heard.
 * waveform: timeSeconds, minimum, maximum (full scale ±1).
 * spectrogram: timeSeconds (shape [T]), frequencyHz (shape [F]), levelDecibels (shape [T, F], row-major).
 * oneTurnAverage: turnFraction in [0, 1), level (dimensionless, mean 1).
 */
export interface Series {
  readonly name: SeriesName;
  readonly columns: readonly SeriesColumn[];
}
