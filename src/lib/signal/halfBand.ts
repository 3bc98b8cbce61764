/** Pairs of taps: short where the signal band is far below the fold, long at the last stage. */
export const SHORT_HALF_BAND_PAIRS = 5;
export const LONG_HALF_BAND_PAIRS = 12;

/** Hamming's window. */
const HAMMING_COEFFICIENTS = [0.54, 0.46] as const;

/**
 * Halves the sample rate behind a linear-phase half-band low-pass; every second tap of it is zero.
 *
 * @param samples Float32Array, shape [sampleCount]
 * @param pairCount pairs of taps beside the middle one, ≥ 1
 * @returns Float32Array, shape [floor(sampleCount / 2)]; sample n stands at time 2n of the input
 * Reference: R. Crochiere & L. Rabiner (1983), Multirate digital signal processing, section 4.3.
 */
export function decimateByTwo(samples: Float32Array, pairCount: number): Float32Array {
  const taps = halfBandTaps(pairCount);
  const output = new Float32Array(Math.floor(samples.length / 2));
  const reach = 2 * pairCount;
  for (let sample = 0; sample < output.length; sample++) {
    const centre = 2 * sample;
    let sum = 0.5 * (samples[centre] as number);
    if (centre >= reach && centre + reach < samples.length) {
      for (let pair = 0, offset = 1; pair < pairCount; pair++, offset += 2) {
        sum += (taps[pair] as number) * ((samples[centre - offset] as number) + (samples[centre + offset] as number));
      }
    } else {
      for (let pair = 0, offset = 1; pair < pairCount; pair++, offset += 2) {
        sum += (taps[pair] as number) * ((samples[centre - offset] ?? 0) + (samples[centre + offset] ?? 0));
      }
    }
    output[sample] = sum;
  }
  return output;
}

/** Taps at distance 1, 3, 5 … from the middle, scaled for unit gain at 0 Hz together with the middle tap of 0.5. */
function halfBandTaps(pairCount: number): Float64Array {
  const taps = new Float64Array(pairCount);
  for (let pair = 0; pair < pairCount; pair++) {
    const offset = 2 * pair + 1;
    const hamming = HAMMING_COEFFICIENTS[0] + HAMMING_COEFFICIENTS[1] * Math.cos((Math.PI * offset) / (2 * pairCount));
    taps[pair] = (hamming * Math.sin((Math.PI * offset) / 2)) / (Math.PI * offset);
  }
  const sum = taps.reduce((total, tap) => total + tap, 0);
  return taps.map((tap) => (tap * 0.25) / sum);
}
