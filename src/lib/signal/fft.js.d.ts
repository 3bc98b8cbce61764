/** The part of fft.js 4 that the project uses; the package brings no types. */
declare module 'fft.js' {
  export default class FFT {
    /** @param size power of two ≥ 2 */
    constructor(size: number);
    /** Twiddle factors, interleaved cosine and −sine. */
    table: number[] | Float64Array;
    /** Writes bins 0 … size/2 of a real input, interleaved re, im; the upper half is left undefined. */
    realTransform(out: Float64Array, samples: ArrayLike<number>): void;
    /** Complex transform of interleaved re, im. */
    transform(out: Float64Array, complexSamples: ArrayLike<number>): void;
    /** Inverse of `transform`, scaled by 1/size. */
    inverseTransform(out: Float64Array, spectrum: ArrayLike<number>): void;
  }
}
