import { fftPlan } from './fftPlan.ts';
import { hannWindow } from './window.ts';

/** A power spectrum and the frequencies it stands at. */
export interface PowerSpectrum {
  /** Power per bin, shape [size / 2 + 1]; a sine in the middle of a bin gives its power, 0.5 for full scale. */
  readonly power: Float64Array;
  /** Distance of the bins, Hz. */
  readonly binHz: number;
  /** Number of segments that were averaged. */
  readonly segmentCount: number;
}

/**
 * Average power spectrum over half-overlapping Hann segments.
 *
 * A signal shorter than one segment is windowed over its real length and padded with zeros.
 *
 * @param samples shape [sampleCount], at least 2
 * @param size transform length, a power of two
 * @param mostSegments upper limit of the segments, spread evenly over the signal
 * Reference: P. Welch (1967), The use of fast Fourier transform for the estimation of power spectra, IEEE Trans. AU-15.
 */
export function averageSpectrum(
  samples: Float32Array,
  sampleRateHz: number,
  size: number,
  mostSegments = Infinity,
): PowerSpectrum {
  const plan = fftPlan(size);
  const length = Math.min(size, samples.length);
  const window = hannWindow(length);
  const available = Math.max(1, Math.floor((samples.length - length) / (length / 2)) + 1);
  const segmentCount = Math.min(available, mostSegments);
  const power = new Float64Array(size / 2 + 1);
  // Two sides of the spectrum and the window's coherent gain of a half: 2 / (length / 2)².
  const scale = 2 / (length / 2) ** 2 / segmentCount;
  for (let segment = 0; segment < segmentCount; segment++) {
    const start = segmentCount === 1 ? 0 : Math.floor((segment * (samples.length - length)) / (segmentCount - 1));
    plan.input.fill(0);
    for (let sample = 0; sample < length; sample++) {
      plan.input[sample] = (samples[start + sample] as number) * (window[sample] as number);
    }
    const spectrum = plan.transformReal();
    for (let bin = 0; bin < power.length; bin++) {
      const real = spectrum[2 * bin] as number;
      const imaginary = spectrum[2 * bin + 1] as number;
      power[bin] = (power[bin] as number) + scale * (real * real + imaginary * imaginary);
    }
  }
  return { power, binHz: sampleRateHz / size, segmentCount };
}
