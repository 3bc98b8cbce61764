import { filterInPlace, lowPassBiquad, BUTTERWORTH_Q } from '../biquad.ts';
import type { Random } from './random.ts';

/** Colours of background noise: white, falling 3 dB per octave, or gusts of low rumble. */
export const NOISE_COLOURS = ['white', 'pink', 'wind'] as const;
export type NoiseColour = (typeof NOISE_COLOURS)[number];

const WIND_CORNER_HZ = 180;
/** Correlation time of gusts. */
const GUST_SECONDS = 0.6;

/**
 * Gaussian background noise of root mean square 1.
 *
 * @returns Float64Array, shape [sampleCount]
 * Reference for pink: a sum of three first-order filters by P. Kellet (1999), within ±0.5 dB of −3 dB per octave.
 */
export function colouredNoise(
  colour: NoiseColour,
  options: {
    readonly sampleCount: number;
    readonly sampleRateHz: number;
    readonly random: Random;
  },
): Float64Array {
  const noise = new Float64Array(options.sampleCount);
  for (let sample = 0; sample < noise.length; sample++) noise[sample] = options.random.normal();
  if (colour === 'pink') makePink(noise);
  if (colour === 'wind') makeWind(noise, options.sampleRateHz, options.random);
  return scaledToUnitPower(noise);
}

function makePink(noise: Float64Array): void {
  let slow = 0;
  let medium = 0;
  let fast = 0;
  for (let sample = 0; sample < noise.length; sample++) {
    const white = noise[sample] as number;
    slow = 0.99765 * slow + white * 0.099046;
    medium = 0.963 * medium + white * 0.2965164;
    fast = 0.57 * fast + white * 1.0526913;
    noise[sample] = slow + medium + fast + white * 0.1848;
  }
}

function makeWind(noise: Float64Array, sampleRateHz: number, random: Random): void {
  const section = lowPassBiquad({
    frequencyHz: WIND_CORNER_HZ,
    sampleRateHz,
    quality: BUTTERWORTH_Q,
  });
  filterInPlace(noise, [section, section]);
  const memory = Math.exp(-1 / (GUST_SECONDS * sampleRateHz));
  const drive = Math.sqrt(1 - memory * memory);
  let gust = random.normal();
  for (let sample = 0; sample < noise.length; sample++) {
    gust = memory * gust + drive * random.normal();
    noise[sample] = (noise[sample] as number) * Math.exp(gust);
  }
}

function scaledToUnitPower(noise: Float64Array): Float64Array {
  const power = noise.reduce((sum, value) => sum + value * value, 0) / Math.max(1, noise.length);
  const scale = power > 0 ? 1 / Math.sqrt(power) : 0;
  return noise.map((value) => value * scale);
}
