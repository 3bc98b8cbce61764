import type { AnalysisSettings } from '#lib/analysis/settings.ts';
import type { NoiseColour } from '#lib/signal/synthesis/noise.ts';
import type { Random } from '#lib/signal/synthesis/random.ts';
import type { FixedTone } from '#lib/signal/synthesis/tonalParts.ts';
import { synthesiseMotor, type SynthesisedRecording } from '#lib/signal/synthesis/synthesiseMotor.ts';
import { median } from '#lib/statistics/quantiles.ts';
import { rpmFromEventHertz } from '#lib/units/rotation.ts';
import {
  anyMotor,
  brushless,
  commutator,
  type DrawnMotor,
  fan,
  gear,
  type MotorDraw,
  twoContacts,
} from './drawnMotors.ts';
import { addRoomSound, levelOf, music, type RoomSound, voice } from './roomSounds.ts';
import { coastDown, runUp, type SpeedCourse, steady, step, stopStart, wobble } from './speedCourses.ts';
import {
  classRandom,
  logUniform,
  oneOf,
  type TrialClass,
  type TrialRecording,
  type TrialTruth,
} from './trialRecording.ts';

/** What makes a class differ from a steady motor in a quiet room. */
interface MotorCase {
  readonly draw: MotorDraw;
  readonly course?: SpeedCourse;
  readonly noise?: { readonly colour: NoiseColour; readonly levelDecibels: readonly [number, number] };
  readonly gain?: readonly [number, number];
  readonly hasAutomaticGain?: boolean;
  readonly sampleRateHz?: number;
  readonly settings?: Partial<AnalysisSettings>;
  /** Tones of the room. */
  readonly fixedTones?: (random: Random) => FixedTone[];
  /** A sound beside the motor, at a fifth to four fifths of its level. */
  readonly beside?: RoomSound;
}

const MOTOR_CASES: Readonly<Record<string, MotorCase>> = {
  'two contacts': { draw: twoContacts(200, 1800) },
  'two contacts, slow': { draw: twoContacts(40, 200), settings: { minimumRpm: 20 } },
  '3 segments': { draw: commutator(3) },
  '5 segments': { draw: commutator(5) },
  '7 segments': { draw: commutator(7) },
  fan: { draw: fan, noise: { colour: 'pink', levelDecibels: [-45, -25] } },
  gear: { draw: gear },
  brushless: { draw: brushless },
  'run-up': { draw: anyMotor, course: runUp },
  'coast-down': { draw: anyMotor, course: coastDown },
  step: { draw: anyMotor, course: step },
  wobble: { draw: anyMotor, course: wobble },
  'stop-start': { draw: anyMotor, course: stopStart },
  'beside hum': { draw: anyMotor, fixedTones: (random) => [mainsHum(random)] },
  'beside a second motor': { draw: anyMotor, beside: secondMotor },
  'beside music': { draw: anyMotor, beside: music },
  'beside speech': { draw: anyMotor, beside: voice },
  'in wind': { draw: anyMotor, noise: { colour: 'wind', levelDecibels: [-30, -14] } },
  'low signal': { draw: anyMotor, noise: { colour: 'white', levelDecibels: [-26, -18] } },
  clipped: { draw: anyMotor, gain: [6, 20] },
  'automatic gain': { draw: anyMotor, hasAutomaticGain: true },
  '8 kHz': { draw: anyMotor, sampleRateHz: 8000 },
};

/** Recordings of motors, by class. */
export const MOTOR_CLASSES: readonly TrialClass[] = Object.entries(MOTOR_CASES).map(([name, motorCase]) => ({
  name,
  hasMotor: true,
  make: (seed) => motorRecording(name, motorCase, seed),
}));

const QUIET_ROOM_DECIBELS = [-55, -30] as const;
/** No microphone hears events above this part of the sample rate. */
const HIGHEST_EVENT_FRACTION = 0.3;
/** Slower than this part of its top speed a motor counts as standing: it makes no sound to speak of. */
const TURNING_FRACTION = 0.05;

function motorRecording(className: string, motorCase: MotorCase, seed: number): TrialRecording {
  const random = classRandom(className, seed);
  const sampleRateHz = motorCase.sampleRateHz ?? oneOf(random, [48_000, 44_100]);
  const durationSeconds = random.between(4, 9);
  const motor = motorCase.draw(random);
  const fastestRpm = rpmFromEventHertz(HIGHEST_EVENT_FRACTION * sampleRateHz, motor.eventsPerTurn);
  const shaftSpeedRpm = Math.min(motor.shaftSpeedRpm, fastestRpm);
  const course = motorCase.course ?? steady;
  const { samples, truth } = synthesiseMotor({
    seed: Math.floor(random.between(0, 2 ** 31)),
    durationSeconds,
    sampleRateHz,
    speed: course({ shaftSpeedRpm, durationSeconds, random }),
    wanderFraction: random.between(0, 0.0015),
    ...soundOf(motor, motorCase, random),
  });
  if (motorCase.beside) {
    const sound = motorCase.beside({ sampleCount: samples.length, sampleRateHz, random });
    addRoomSound(samples, sound, random.between(0.2, 0.8) * levelOf(samples));
  }
  return {
    className,
    seed,
    samples,
    sampleRateHz,
    settings: { eventsPerTurn: motor.eventsPerTurn, ...motorCase.settings },
    truth: truthOf(truth, course === steady),
  };
}

function soundOf({ sound }: DrawnMotor, motorCase: MotorCase, random: Random) {
  const { colour, levelDecibels } = motorCase.noise ?? {
    colour: oneOf<NoiseColour>(random, ['pink', 'white']),
    levelDecibels: QUIET_ROOM_DECIBELS,
  };
  return {
    ...sound,
    fixedTones: [...(sound.fixedTones ?? []), ...(motorCase.fixedTones?.(random) ?? [])],
    noise: { colour, levelDecibels: random.between(...levelDecibels) },
    phone: {
      highPassHz: random.between(70, 160),
      gain: motorCase.gain ? random.between(...motorCase.gain) : 1,
      hasAutomaticGain: motorCase.hasAutomaticGain ?? false,
    },
  };
}

function truthOf({ timeSeconds, shaftSpeedRpm }: SynthesisedRecording['truth'], isSteady: boolean): TrialTruth {
  const fastestRpm = Math.max(...shaftSpeedRpm);
  return {
    shaftSpeedRpm: median(shaftSpeedRpm.filter((speed) => speed > TURNING_FRACTION * fastestRpm)),
    isSteady,
    timesSeconds: timeSeconds,
    speedsRpm: shaftSpeedRpm,
  };
}

/** Hum of either grid, as steady as grids are, from hardly heard to as loud as the motor. */
export function mainsHum(random: Random): FixedTone {
  return {
    frequencyHz: oneOf(random, [50, 60]) * (1 + random.between(-5e-4, 5e-4)),
    amplitude: logUniform(random, 0.01, 0.1),
    harmonicCount: oneOf(random, [4, 5, 6]),
  };
}

function secondMotor({ sampleCount, sampleRateHz, random }: Parameters<RoomSound>[0]): Float64Array {
  const { samples } = synthesiseMotor({
    seed: Math.floor(random.between(0, 2 ** 31)),
    durationSeconds: sampleCount / sampleRateHz,
    sampleRateHz,
    speed: [{ timeSeconds: 0, shaftSpeedRpm: logUniform(random, 1000, 9000) }],
    wanderFraction: 0.001,
    ...commutator(3)(random).sound,
  });
  const level = levelOf(samples);
  return Float64Array.from(samples, (value) => value / level);
}
