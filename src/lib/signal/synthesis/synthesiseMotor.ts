import { amplitudeFromDecibels } from '#lib/units/decibels.ts';
import { addContactClicks } from './contactClicks.ts';
import type { ContactOptions } from './contactClicks.ts';
import { colouredNoise } from './noise.ts';
import type { NoiseColour } from './noise.ts';
import { recordWithPhone } from './phone.ts';
import type { PhoneOptions } from './phone.ts';
import { createRandom } from './random.ts';
import { shaftMotion } from './speedProfile.ts';
import type { ShaftMotion, SpeedPoint } from './speedProfile.ts';
import { addFixedTone, addShaftTones } from './tonalParts.ts';
import type { FixedTone, ShaftTones } from './tonalParts.ts';

/** What a synthetic recording contains; parts that are left out are silent. */
export interface MotorSoundOptions {
  /** The same seed and options give the same samples. */
  readonly seed: number;
  readonly durationSeconds: number;
  readonly sampleRateHz: number;
  readonly speed: readonly SpeedPoint[];
  /** Slow random wander of the speed, root mean square fraction; 0 for a perfectly steady shaft. */
  readonly wanderFraction?: number;
  readonly contacts?: readonly ContactOptions[];
  readonly shaftTones?: readonly ShaftTones[];
  readonly fixedTones?: readonly FixedTone[];
  readonly noise?: { readonly colour: NoiseColour; readonly levelDecibels: number } | undefined;
  readonly phone?: PhoneOptions;
}

/** A recording whose truth is known. */
export interface SynthesisedRecording {
  /** Mono samples, full scale ±1, shape [sampleCount]. */
  readonly samples: Float32Array;
  /** The shaft speed every `TRUTH_STEP_SECONDS`. */
  readonly truth: {
    readonly timeSeconds: Float32Array;
    readonly shaftSpeedRpm: Float32Array;
  };
}

/** Spacing of the true speed's points. */
export const TRUTH_STEP_SECONDS = 0.05;

const PLAIN_PHONE: PhoneOptions = {
  highPassHz: 100,
  gain: 1,
  hasAutomaticGain: false,
};

/**
 * The sound of a small motor as a phone records it, made from what happens in the motor: contacts click at
 * shaft angles and make the body ring, torque ripples, blades pass, the room hums and hisses.
 *
 * @param options see `MotorSoundOptions`; noise level in dB of full scale (root mean square)
 * @returns samples and the true speed
 * @example synthesiseMotor({ seed: 1, durationSeconds: 1, sampleRateHz: 8000, speed: [{ timeSeconds: 0, shaftSpeedRpm: 600 }] }).samples.length // 8000
 */
export function synthesiseMotor(options: MotorSoundOptions): SynthesisedRecording {
  const { sampleRateHz } = options;
  const random = createRandom(options.seed);
  const sampleCount = Math.round(options.durationSeconds * sampleRateHz);
  const motion = shaftMotion({
    points: options.speed,
    wanderFraction: options.wanderFraction ?? 0,
    sampleCount,
    sampleRateHz,
    random,
  });
  const sound = new Float64Array(sampleCount);
  for (const contacts of options.contacts ?? []) addContactClicks(sound, motion, { ...contacts, sampleRateHz, random });
  for (const tones of options.shaftTones ?? []) addShaftTones(sound, motion, { ...tones, random });
  for (const tone of options.fixedTones ?? []) addFixedTone(sound, tone, { sampleRateHz, random });
  if (options.noise) {
    const level = amplitudeFromDecibels(options.noise.levelDecibels);
    const noise = colouredNoise(options.noise.colour, {
      sampleCount,
      sampleRateHz,
      random,
    });
    for (let sample = 0; sample < sampleCount; sample++)
      sound[sample] = (sound[sample] as number) + level * (noise[sample] as number);
  }
  return {
    samples: recordWithPhone(sound, options.phone ?? PLAIN_PHONE, sampleRateHz),
    truth: truthOf(motion, sampleRateHz),
  };
}

function truthOf(motion: ShaftMotion, sampleRateHz: number): SynthesisedRecording['truth'] {
  const stepSamples = TRUTH_STEP_SECONDS * sampleRateHz;
  const count = Math.floor(motion.shaftSpeedRpm.length / stepSamples);
  const timeSeconds = new Float32Array(count);
  const shaftSpeedRpm = new Float32Array(count);
  for (let point = 0; point < count; point++) {
    timeSeconds[point] = point * TRUTH_STEP_SECONDS;
    shaftSpeedRpm[point] = motion.shaftSpeedRpm[Math.round(point * stepSamples)] ?? 0;
  }
  return { timeSeconds, shaftSpeedRpm };
}
