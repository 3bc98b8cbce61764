/** Coefficients of one second-order section, normalised so that a0 = 1. */
export interface Biquad {
  readonly b0: number;
  readonly b1: number;
  readonly b2: number;
  readonly a1: number;
  readonly a2: number;
}

/** Quality factor of a maximally flat second-order section. */
export const BUTTERWORTH_Q = Math.SQRT1_2;

interface SectionDesign {
  /** Corner or centre frequency, Hz, in (0, sampleRateHz / 2). */
  readonly frequencyHz: number;
  readonly sampleRateHz: number;
  /** Quality factor, > 0. */
  readonly quality: number;
}

/**
 * Second-order high-pass, 12 dB per octave, unit gain far above the corner.
 * Reference: R. Bristow-Johnson, Cookbook formulae for audio EQ biquad filter coefficients (W3C note 2021).
 */
export function highPassBiquad(design: SectionDesign): Biquad {
  const { cosine, alpha } = angleOf(design);
  return normalised((1 + cosine) / 2, -(1 + cosine), (1 + cosine) / 2, cosine, alpha);
}

/** Second-order low-pass, 12 dB per octave, unit gain at 0 Hz. Reference: as `highPassBiquad`. */
export function lowPassBiquad(design: SectionDesign): Biquad {
  const { cosine, alpha } = angleOf(design);
  return normalised((1 - cosine) / 2, 1 - cosine, (1 - cosine) / 2, cosine, alpha);
}

/** Second-order band-pass with unit gain at the centre. Reference: as `highPassBiquad`. */
export function bandPassBiquad(design: SectionDesign): Biquad {
  const { cosine, alpha } = angleOf(design);
  return normalised(alpha, 0, -alpha, cosine, alpha);
}

/**
 * Runs sections one after another over samples, in place, from rest.
 *
 * @param samples Float32Array or Float64Array, shape [sampleCount]; overwritten
 * @returns the same array
 */
export function filterInPlace<Samples extends Float32Array | Float64Array>(
  samples: Samples,
  sections: readonly Biquad[],
): Samples {
  createFilter(sections)(samples);
  return samples;
}

/**
 * A filter that keeps its state from one call to the next, for signals that come in pieces.
 *
 * @returns a function that filters a piece in place
 */
export function createFilter(sections: readonly Biquad[]): (piece: Float32Array | Float64Array) => void {
  const delays = new Float64Array(2 * sections.length);
  return (piece) => {
    for (const [index, { b0, b1, b2, a1, a2 }] of sections.entries()) {
      let delay1 = delays[2 * index] as number;
      let delay2 = delays[2 * index + 1] as number;
      for (let sample = 0; sample < piece.length; sample++) {
        const input = piece[sample] as number;
        const output = b0 * input + delay1;
        delay1 = b1 * input - a1 * output + delay2;
        delay2 = b2 * input - a2 * output;
        piece[sample] = output;
      }
      delays[2 * index] = delay1;
      delays[2 * index + 1] = delay2;
    }
  };
}

function angleOf({ frequencyHz, sampleRateHz, quality }: SectionDesign): {
  cosine: number;
  alpha: number;
} {
  if (!(frequencyHz > 0 && frequencyHz < sampleRateHz / 2)) {
    throw new RangeError(`biquad: frequencyHz must be in (0, ${sampleRateHz / 2}), got ${frequencyHz}`);
  }
  const angle = (2 * Math.PI * frequencyHz) / sampleRateHz;
  return { cosine: Math.cos(angle), alpha: Math.sin(angle) / (2 * quality) };
}

function normalised(b0: number, b1: number, b2: number, cosine: number, alpha: number): Biquad {
  const a0 = 1 + alpha;
  return {
    b0: b0 / a0,
    b1: b1 / a0,
    b2: b2 / a0,
    a1: (-2 * cosine) / a0,
    a2: (1 - alpha) / a0,
  };
}
