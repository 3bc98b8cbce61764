import { hertzFromRpm } from '#lib/units/rotation.ts';
import type { Random } from './random.ts';

/** One point of a speed profile; between points the speed is interpolated linearly. */
export interface SpeedPoint {
  readonly timeSeconds: number;
  /** Shaft speed, rpm, ≥ 0; 0 is standing still. */
  readonly shaftSpeedRpm: number;
}

interface ProfileOptions {
  /** At least one point, ascending in time; constant before the first and after the last. */
  readonly points: readonly SpeedPoint[];
  /** Slow random wander of the speed, root mean square as a fraction of the speed, [0, 0.1]. */
  readonly wanderFraction: number;
  readonly sampleCount: number;
  readonly sampleRateHz: number;
  readonly random: Random;
}

/** The shaft's motion, one value per audio sample. */
export interface ShaftMotion {
  /** Shaft speed, rpm, shape [sampleCount]. */
  readonly shaftSpeedRpm: Float64Array;
  /** Angle turned since the start, turns, shape [sampleCount]. */
  readonly turns: Float64Array;
}

/** Correlation time of the wander: the inertia of a small rotor and the slow change of its friction. */
const WANDER_TIME_SECONDS = 0.8;

/** Integrates a speed profile with random wander (a first-order Gauss–Markov process) into angle. */
export function shaftMotion(options: ProfileOptions): ShaftMotion {
  const { points, wanderFraction, sampleCount, sampleRateHz, random } = options;
  const shaftSpeedRpm = new Float64Array(sampleCount);
  const turns = new Float64Array(sampleCount);
  const memory = Math.exp(-1 / (WANDER_TIME_SECONDS * sampleRateHz));
  const drive = wanderFraction * Math.sqrt(1 - memory * memory);
  let wander = wanderFraction * random.normal();
  let angle = random.uniform();
  let segment = 0;
  for (let sample = 0; sample < sampleCount; sample++) {
    const timeSeconds = sample / sampleRateHz;
    while (segment + 1 < points.length - 1 && (points[segment + 1]?.timeSeconds ?? Infinity) <= timeSeconds) segment++;
    const speed = speedAt(points[segment], points[segment + 1], timeSeconds) * (1 + wander);
    shaftSpeedRpm[sample] = speed;
    angle += hertzFromRpm(speed) / sampleRateHz;
    turns[sample] = angle;
    if (wanderFraction > 0) wander = memory * wander + drive * random.normal();
  }
  return { shaftSpeedRpm, turns };
}

function speedAt(before: SpeedPoint | undefined, after: SpeedPoint | undefined, timeSeconds: number): number {
  if (!before) throw new RangeError('shaftMotion: points must hold at least one point');
  if (!after || timeSeconds <= before.timeSeconds) return before.shaftSpeedRpm;
  const span = after.timeSeconds - before.timeSeconds;
  const part = Math.min(1, (timeSeconds - before.timeSeconds) / span);
  return before.shaftSpeedRpm + part * (after.shaftSpeedRpm - before.shaftSpeedRpm);
}
