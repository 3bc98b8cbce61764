import { amplitudeFromDecibels } from '#lib/units/decibels.ts';
import type { Random } from './random.ts';
import type { ShaftMotion } from './speedProfile.ts';

/** Tones locked to the shaft: commutation ripple, blade passing, gear mesh, unbalance. */
export interface ShaftTones {
  /** Periods of the fundamental in one turn, > 0; may be a fraction. */
  readonly perTurn: number;
  /** Amplitude of the fundamental, full scale ±1. */
  readonly amplitude: number;
  /** Number of harmonics, ≥ 1. */
  readonly harmonicCount: number;
  /** Fall of the harmonics, dB per octave, ≥ 0. */
  readonly slopeDecibelsPerOctave: number;
  /** Depth of the once-a-turn modulation that makes sidebands, [0, 1). */
  readonly modulationDepth: number;
}

/** A tone that does not follow the shaft: hum, a switching regulator's whine. */
export interface FixedTone {
  readonly frequencyHz: number;
  /** Full scale ±1. */
  readonly amplitude: number;
  /** Number of harmonics, ≥ 1, each at half the amplitude of the last. */
  readonly harmonicCount: number;
}

/** Highest fraction of the sample rate at which a tone is still made: what lies above would alias. */
const HIGHEST_TONE_FRACTION = 0.48;

/** Adds shaft-locked tones with random phases to `output`, shape [sampleCount]. */
export function addShaftTones(
  output: Float64Array,
  motion: ShaftMotion,
  options: ShaftTones & { readonly random: Random },
): void {
  const { perTurn, random } = options;
  const modulationPhase = random.uniform();
  for (let harmonic = 1; harmonic <= options.harmonicCount; harmonic++) {
    const phase = random.uniform();
    const level = options.amplitude * amplitudeFromDecibels(-options.slopeDecibelsPerOctave * Math.log2(harmonic));
    for (let sample = 1; sample < output.length; sample++) {
      const turns = motion.turns[sample] as number;
      const advance = (turns - (motion.turns[sample - 1] as number)) * harmonic * perTurn;
      if (advance <= 0 || advance > HIGHEST_TONE_FRACTION) continue;
      const modulation = 1 + options.modulationDepth * Math.cos(2 * Math.PI * (turns + modulationPhase));
      output[sample] =
        (output[sample] as number) + level * modulation * Math.cos(2 * Math.PI * (harmonic * perTurn * turns + phase));
    }
  }
}

/** Adds a fixed tone and its harmonics with random phases to `output`, shape [sampleCount]. */
export function addFixedTone(
  output: Float64Array,
  tone: FixedTone,
  options: { readonly sampleRateHz: number; readonly random: Random },
): void {
  for (let harmonic = 1; harmonic <= tone.harmonicCount; harmonic++) {
    const cyclesPerSample = (harmonic * tone.frequencyHz) / options.sampleRateHz;
    if (cyclesPerSample > HIGHEST_TONE_FRACTION) return;
    const phase = options.random.uniform();
    const level = tone.amplitude / 2 ** (harmonic - 1);
    for (let sample = 0; sample < output.length; sample++) {
      output[sample] = (output[sample] as number) + level * Math.cos(2 * Math.PI * (cyclesPerSample * sample + phase));
    }
  }
}
