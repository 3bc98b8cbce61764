/** What the recordings of the invented club sound like: seeded, so that every start makes the same files. */
import { commutatorSound, fanSound, type MotorSound, twoContactSound } from '#lib/signal/synthesis/motorSounds.ts';
import type { SpeedPoint } from '#lib/signal/synthesis/speedProfile.ts';
import { type MotorSoundOptions, synthesiseMotor } from '#lib/signal/synthesis/synthesiseMotor.ts';
import { encodeWav } from './encodeWav.ts';

const SAMPLE_RATE_HZ = 44_100;
/** How much the speed of a small motor wanders under a steady supply, root mean square. */
const WANDER_FRACTION = 0.002;
const ROOM_NOISE = { colour: 'pink', levelDecibels: -46 } as const;
/** The supply on the bench, heard beside the motor. */
const SUPPLY_HUM = { frequencyHz: 100, amplitude: 0.004, harmonicCount: 3 } as const;

export const DEMO_MOTORS = {
  heron: twoContactSound(),
  kestrel: commutatorSound(6),
  dunlin: commutatorSound(10),
  swift: fanSound(4),
} as const satisfies Record<string, MotorSound>;

interface DemoSound {
  readonly seed: number;
  readonly motor: MotorSound;
  readonly durationSeconds: number;
  readonly speed: readonly SpeedPoint[];
}

function samplesOf({ motor, ...sound }: DemoSound): Float32Array {
  const options: MotorSoundOptions = {
    ...sound,
    ...motor,
    sampleRateHz: SAMPLE_RATE_HZ,
    wanderFraction: WANDER_FRACTION,
    noise: ROOM_NOISE,
    fixedTones: [SUPPLY_HUM],
  };
  return synthesiseMotor(options).samples;
}

/** A WAV of 16 bits. */
export function motorWav(sound: DemoSound): Buffer {
  return encodeWav(samplesOf(sound), SAMPLE_RATE_HZ, 'int16');
}

export function steadyWav(seed: number, motor: MotorSound, shaftSpeedRpm: number): Buffer {
  return motorWav({ seed, motor, durationSeconds: 4, speed: [{ timeSeconds: 0, shaftSpeedRpm }] });
}

/** The room, and a motor on a battery that does not start. */
export function stalledWav(seed: number): Buffer {
  const standstill = [{ timeSeconds: 0, shaftSpeedRpm: 0 }];
  const sound = { seed, durationSeconds: 4, sampleRateHz: SAMPLE_RATE_HZ, speed: standstill, noise: ROOM_NOISE };
  return encodeWav(synthesiseMotor(sound).samples, SAMPLE_RATE_HZ, 'int16');
}

/** A float file whose end was never filled with sound: the recorder crashed. */
export function brokenWav(seed: number, motor: MotorSound, shaftSpeedRpm: number): Buffer {
  const samples = samplesOf({ seed, motor, durationSeconds: 2, speed: [{ timeSeconds: 0, shaftSpeedRpm }] });
  samples.fill(Number.NaN, samples.length / 2);
  return encodeWav(samples, SAMPLE_RATE_HZ, 'float32');
}

interface CoastDown {
  readonly startRpm: number;
  /** When the supply is cut. */
  readonly cutSeconds: number;
  /** Deceleration that does not depend on the speed: dry friction. */
  readonly constantRpmPerSecond: number;
  /** Deceleration per speed: bearings and air. */
  readonly proportionalPerSecond: number;
  readonly durationSeconds: number;
}

const PROFILE_STEP_SECONDS = 0.05;

/**
 * Speed after the supply is cut: dn/dt = −(a + b·n) down to standstill, whose solution is
 * n(t) = (n₀ + a/b)·e^(−b·t) − a/b.
 */
export function coastDownSpeed(coastDown: CoastDown): SpeedPoint[] {
  const { startRpm, cutSeconds, constantRpmPerSecond, proportionalPerSecond, durationSeconds } = coastDown;
  const offsetRpm = constantRpmPerSecond / proportionalPerSecond;
  const pointCount = Math.floor(durationSeconds / PROFILE_STEP_SECONDS) + 1;
  return Array.from({ length: pointCount }, (_, point) => {
    const timeSeconds = point * PROFILE_STEP_SECONDS;
    const decay = Math.exp(-proportionalPerSecond * Math.max(0, timeSeconds - cutSeconds));
    return { timeSeconds, shaftSpeedRpm: Math.max(0, (startRpm + offsetRpm) * decay - offsetRpm) };
  });
}
