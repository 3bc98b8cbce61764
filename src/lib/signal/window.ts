/**
 * Samples of a cosine-sum window in its periodic form, w(n) = Σ (−1)^j a_j cos(2πjn/N).
 *
 * @param length number of samples, ≥ 1
 * @param coefficients a_0, a_1, …; Hann is [0.5, 0.5]
 * @returns Float64Array, shape [length]
 * Reference: F. Harris (1978), On the use of windows for harmonic analysis with the discrete Fourier
 * transform, Proc. IEEE 66(1), section V.
 */
export function cosineSumWindow(length: number, coefficients: readonly number[]): Float64Array {
  const window = new Float64Array(length);
  for (let sample = 0; sample < length; sample++) {
    let value = 0;
    for (const [order, coefficient] of coefficients.entries()) {
      const sign = order % 2 === 0 ? 1 : -1;
      value += sign * coefficient * Math.cos((2 * Math.PI * order * sample) / length);
    }
    window[sample] = value;
  }
  return window;
}

const HANN_COEFFICIENTS = [0.5, 0.5] as const;
const hannWindows = new Map<number, Float64Array>();

/**
 * Hann window in its periodic form; the array is shared between callers and must not be written.
 *
 * @param length number of samples, ≥ 1
 * @example hannWindow(4) // [0, 0.5, 1, 0.5]
 */
export function hannWindow(length: number): Float64Array {
  const known = hannWindows.get(length);
  if (known) return known;
  const window = cosineSumWindow(length, HANN_COEFFICIENTS);
  hannWindows.set(length, window);
  return window;
}

/** Mean of a window: what a tone in the middle of a bin keeps of its amplitude. Reference: Harris (1978), eq. 15. */
export function coherentGain(window: Float64Array): number {
  return sumOf(window) / window.length;
}

/** Equivalent noise bandwidth in bins. Reference: Harris (1978), eq. 11; 1.5 for Hann. */
export function equivalentNoiseBandwidthBins(window: Float64Array): number {
  const energy = window.reduce((sum, value) => sum + value * value, 0);
  return (window.length * energy) / sumOf(window) ** 2;
}

/** Power ratio in (0, 1] that a tone half way between two bins keeps. Reference: Harris (1978), eq. 16. */
export function scallopingPowerRatio(window: Float64Array): number {
  let real = 0;
  let imaginary = 0;
  for (const [sample, value] of window.entries()) {
    const angle = (Math.PI * sample) / window.length;
    real += value * Math.cos(angle);
    imaginary -= value * Math.sin(angle);
  }
  return (real * real + imaginary * imaginary) / sumOf(window) ** 2;
}

function sumOf(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0);
}
