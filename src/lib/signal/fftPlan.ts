import FFT from 'fft.js';

/** A transform of one size with its twiddle factors and work buffers. */
export interface FftPlan {
  /** Transform length, a power of two. */
  readonly size: number;
  /** Input of the next transform, shape [size]; write here, then call `transformReal`. */
  readonly input: Float64Array;
  /**
   * Spectrum of `input`.
   *
   * @returns bins 0 … size/2 interleaved re, im; overwritten on the next call
   */
  readonly transformReal: () => Float64Array;
  /**
   * Spectrum of interleaved complex samples.
   *
   * @param complexSamples shape [2·size], re, im
   * @returns all bins interleaved re, im; overwritten on the next call
   */
  readonly transformComplex: (complexSamples: Float64Array) => Float64Array;
}

const plans = new Map<number, FftPlan>();

/**
 * The plan for one size. Plans are kept and shared: within one thread the buffers of a size belong to
 * whoever called last.
 *
 * @param size power of two in [2, 2²²]
 * @throws {RangeError} when the size is no such number
 * Reference: J. Cooley & J. Tukey (1965), An algorithm for the machine calculation of complex Fourier series;
 * radix-4 implementation of the package fft.js.
 */
export function fftPlan(size: number): FftPlan {
  const known = plans.get(size);
  if (known) return known;
  const plan = createFftPlan(size);
  plans.set(size, plan);
  return plan;
}

function createFftPlan(size: number): FftPlan {
  if (!Number.isInteger(Math.log2(size)) || size < 2 || size > 2 ** 22) {
    throw new RangeError(`fftPlan: size must be a power of two in [2, 4194304], got ${size}`);
  }
  const transform = new FFT(size);
  // Typed twiddle factors keep the inner loops on unboxed numbers.
  transform.table = Float64Array.from(transform.table);
  const input = new Float64Array(size);
  const spectrum = new Float64Array(2 * size);
  return {
    size,
    input,
    transformReal: () => {
      transform.realTransform(spectrum, input);
      return spectrum;
    },
    transformComplex: (complexSamples) => {
      transform.transform(spectrum, complexSamples);
      return spectrum;
    },
  };
}
