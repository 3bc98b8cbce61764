import { bandPassBiquad, filterInPlace } from '../biquad.ts';

/** One mode of the motor's body or its mount. */
export interface Resonance {
  /** Hz; modes above 0.45 of the sample rate are left out. */
  readonly frequencyHz: number;
  /** Sharpness, dimensionless, > 0: 5 is a thud, 50 rings. */
  readonly quality: number;
  /** Relative strength, ≥ 0. */
  readonly gain: number;
}

/** Modes that a phone lying next to a small motor on a table picks up. */
export const TABLE_TOP_RESONANCES: readonly Resonance[] = [
  { frequencyHz: 620, quality: 6, gain: 0.7 },
  { frequencyHz: 1850, quality: 9, gain: 1 },
  { frequencyHz: 3900, quality: 12, gain: 0.8 },
  { frequencyHz: 7200, quality: 14, gain: 0.4 },
];

const HIGHEST_MODE_FRACTION = 0.45;

/** Adds what the resonances ring when driven by `drive` to `output`; both shape [sampleCount]. */
export function excite(
  output: Float64Array,
  drive: Float64Array,
  resonances: readonly Resonance[],
  sampleRateHz: number,
): void {
  for (const { frequencyHz, quality, gain } of resonances) {
    if (frequencyHz > HIGHEST_MODE_FRACTION * sampleRateHz) continue;
    const ringing = filterInPlace(Float64Array.from(drive), [bandPassBiquad({ frequencyHz, sampleRateHz, quality })]);
    // The impulse response of a unit-gain mode starts at ω/Q; the factor makes a click about as high as its amplitude.
    const scale = (gain * quality * sampleRateHz) / (2 * Math.PI * frequencyHz);
    for (let sample = 0; sample < output.length; sample++) {
      output[sample] = (output[sample] as number) + scale * (ringing[sample] as number);
    }
  }
}
