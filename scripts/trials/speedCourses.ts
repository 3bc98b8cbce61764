import type { Random } from '#lib/signal/synthesis/random.ts';
import type { SpeedPoint } from '#lib/signal/synthesis/speedProfile.ts';

interface Course {
  readonly shaftSpeedRpm: number;
  readonly durationSeconds: number;
  readonly random: Random;
}

/** How the speed goes over the recording. */
export type SpeedCourse = (course: Course) => SpeedPoint[];

export function steady({ shaftSpeedRpm }: Course): SpeedPoint[] {
  return [{ timeSeconds: 0, shaftSpeedRpm }];
}

/** From a fifth to a half of the full speed, up to it, and on. */
export function runUp({ shaftSpeedRpm, durationSeconds, random }: Course): SpeedPoint[] {
  const startRpm = random.between(0.2, 0.5) * shaftSpeedRpm;
  return [
    { timeSeconds: 0, shaftSpeedRpm: startRpm },
    { timeSeconds: random.between(0.1, 0.3) * durationSeconds, shaftSpeedRpm: startRpm },
    { timeSeconds: random.between(0.6, 0.9) * durationSeconds, shaftSpeedRpm },
  ];
}

/** Full speed, then the supply is cut: an exponential fall with a time constant of a third of the recording. */
export function coastDown({ shaftSpeedRpm, durationSeconds, random }: Course): SpeedPoint[] {
  const cutSeconds = random.between(0.2, 0.4) * durationSeconds;
  const constantSeconds = durationSeconds / 3;
  return Array.from({ length: Math.ceil(10 * durationSeconds) + 1 }, (_, point) => {
    const timeSeconds = point / 10;
    const decay = Math.exp(-Math.max(0, timeSeconds - cutSeconds) / constantSeconds);
    return { timeSeconds, shaftSpeedRpm: shaftSpeedRpm * decay };
  });
}

/** Two speeds that differ by 10 to 40 %, half a second between them. */
export function step({ shaftSpeedRpm, durationSeconds, random }: Course): SpeedPoint[] {
  const stepSeconds = random.between(0.25, 0.4) * durationSeconds;
  const firstRpm = shaftSpeedRpm * (1 - random.between(0.1, 0.4));
  return [
    { timeSeconds: 0, shaftSpeedRpm: firstRpm },
    { timeSeconds: stepSeconds, shaftSpeedRpm: firstRpm },
    { timeSeconds: stepSeconds + 0.5, shaftSpeedRpm },
  ];
}

/** A slow sine about the speed. */
export function wobble({ shaftSpeedRpm, durationSeconds, random }: Course): SpeedPoint[] {
  const depth = random.between(0.01, 0.06);
  const wobbleHz = random.between(0.1, 0.6);
  return Array.from({ length: Math.ceil(10 * durationSeconds) + 1 }, (_, point) => ({
    timeSeconds: point / 10,
    shaftSpeedRpm: shaftSpeedRpm * (1 + depth * Math.sin((2 * Math.PI * wobbleHz * point) / 10)),
  }));
}

/** Runs, stands still for a quarter to two fifths of the recording, runs again. */
export function stopStart({ shaftSpeedRpm, durationSeconds, random }: Course): SpeedPoint[] {
  const stopSeconds = random.between(0.25, 0.35) * durationSeconds;
  const startSeconds = random.between(0.6, 0.65) * durationSeconds;
  return [
    { timeSeconds: 0, shaftSpeedRpm },
    { timeSeconds: stopSeconds, shaftSpeedRpm },
    { timeSeconds: stopSeconds + 0.3, shaftSpeedRpm: 0 },
    { timeSeconds: startSeconds, shaftSpeedRpm: 0 },
    { timeSeconds: startSeconds + 0.3, shaftSpeedRpm },
  ];
}
