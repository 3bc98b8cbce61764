/** Power relative to the strongest bin below which a spectrum holds nothing but rounding: −100 dB. */
const LEAST_RELATIVE_POWER = 1e-10;

/**
 * Natural logarithm of a power spectrum with a limited dynamic range, so that the rounding noise of a perfectly clean
 * signal does not pass for lines.
 *
 * @param power shape [binCount], ≥ 0
 * @returns a new Float32Array, nepers of power; all equal for silence
 */
export function logPower(power: Float64Array): Float32Array {
  let strongest = Number.MIN_VALUE;
  for (const value of power) strongest = Math.max(strongest, value);
  const least = LEAST_RELATIVE_POWER * strongest + Number.MIN_VALUE;
  const logarithms = new Float32Array(power.length);
  for (let bin = 0; bin < logarithms.length; bin++) logarithms[bin] = Math.log((power[bin] as number) + least);
  return logarithms;
}
