import { BUTTERWORTH_Q, filterInPlace, highPassBiquad } from '../biquad.ts';

/** What a phone does to the sound before it reaches the file. */
export interface PhoneOptions {
  /** Corner of the microphone's high-pass, Hz; phones lie between 70 and 160. */
  readonly highPassHz: number;
  /** Amplification before the converter; what leaves ±1 is clipped. */
  readonly gain: number;
  /** Whether the phone levels loud and soft passages. */
  readonly hasAutomaticGain: boolean;
}

/** Level that automatic gain aims at, root mean square, full scale ±1. */
const AUTOMATIC_GAIN_TARGET = 0.15;
const AUTOMATIC_GAIN_SECONDS = 0.25;
/** Automatic gain never amplifies silence more than this. */
const HIGHEST_AUTOMATIC_GAIN = 50;

/** The samples that the phone stores, full scale ±1, 16 bit steps not applied; `sound` is overwritten on the way. */
export function recordWithPhone(sound: Float64Array, phone: PhoneOptions, sampleRateHz: number): Float32Array {
  filterInPlace(sound, [
    highPassBiquad({
      frequencyHz: phone.highPassHz,
      sampleRateHz,
      quality: BUTTERWORTH_Q,
    }),
  ]);
  if (phone.hasAutomaticGain) levelInPlace(sound, sampleRateHz);
  const samples = new Float32Array(sound.length);
  for (let sample = 0; sample < samples.length; sample++) {
    samples[sample] = Math.max(-1, Math.min(1, phone.gain * (sound[sample] as number)));
  }
  return samples;
}

function levelInPlace(sound: Float64Array, sampleRateHz: number): void {
  const memory = Math.exp(-1 / (AUTOMATIC_GAIN_SECONDS * sampleRateHz));
  let power = AUTOMATIC_GAIN_TARGET ** 2;
  for (let sample = 0; sample < sound.length; sample++) {
    const value = sound[sample] as number;
    power = memory * power + (1 - memory) * value * value;
    sound[sample] = value * Math.min(HIGHEST_AUTOMATIC_GAIN, AUTOMATIC_GAIN_TARGET / Math.sqrt(power + Number.EPSILON));
  }
}
