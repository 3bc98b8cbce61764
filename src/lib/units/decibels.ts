/** Decibels per factor of ten of a power (IEC 60027-3). */
const DECIBELS_PER_POWER_DECADE = 10;
/** Decibels per factor of ten of an amplitude: power goes with its square. */
const DECIBELS_PER_AMPLITUDE_DECADE = 20;

/** Amplitude ratio of a level in decibels. @example amplitudeFromDecibels(20) // 10 */
export function amplitudeFromDecibels(levelDecibels: number): number {
  return 10 ** (levelDecibels / DECIBELS_PER_AMPLITUDE_DECADE);
}

/** Power ratio of a level in decibels. @example powerFromDecibels(20) // 100 */
export function powerFromDecibels(levelDecibels: number): number {
  return 10 ** (levelDecibels / DECIBELS_PER_POWER_DECADE);
}

/** Level in decibels of an amplitude ratio ≥ 0; −Infinity for 0. @example decibelsFromAmplitude(10) // 20 */
export function decibelsFromAmplitude(amplitudeRatio: number): number {
  return DECIBELS_PER_AMPLITUDE_DECADE * Math.log10(amplitudeRatio);
}

/** Level in decibels of a power ratio ≥ 0; −Infinity for 0. @example decibelsFromPower(100) // 20 */
export function decibelsFromPower(powerRatio: number): number {
  return DECIBELS_PER_POWER_DECADE * Math.log10(powerRatio);
}

/** Level in decibels of the natural logarithm of a power ratio. @example decibelsFromLogPower(Math.LN10) // 10 */
export function decibelsFromLogPower(logPower: number): number {
  return (DECIBELS_PER_POWER_DECADE / Math.LN10) * logPower;
}
