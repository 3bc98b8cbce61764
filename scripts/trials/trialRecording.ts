import type { AnalysisSettings } from '#lib/analysis/settings.ts';
import { createRandom, type Random } from '#lib/signal/synthesis/random.ts';

/** What the shaft of a made recording really did. */
export interface TrialTruth {
  /** Median shaft speed while turning, rpm. */
  readonly shaftSpeedRpm: number;
  /** Whether the speed was meant to stay the same. */
  readonly isSteady: boolean;
  /** Ascending, one per point of `speedsRpm`. */
  readonly timesSeconds: Float32Array;
  /** Shaft speed, rpm, ≥ 0. */
  readonly speedsRpm: Float32Array;
}

/** A recording made for the trials. */
export interface TrialRecording {
  readonly className: string;
  readonly seed: number;
  /** Mono, full scale ±1. */
  readonly samples: Float32Array;
  readonly sampleRateHz: number;
  /** What a person would have entered; the rest stays at its default. */
  readonly settings: Partial<AnalysisSettings>;
  /** Null where nothing turns. */
  readonly truth: TrialTruth | null;
}

/** A kind of recording; the same seed makes the same one. */
export interface TrialClass {
  readonly name: string;
  readonly hasMotor: boolean;
  readonly make: (seed: number) => TrialRecording;
}

/** A generator that depends on the class's name and not on its place in a list (FNV-1a). */
export function classRandom(className: string, seed: number): Random {
  let hash = 0x811c9dc5 ^ seed;
  for (const letter of className) hash = Math.imul(hash ^ (letter.codePointAt(0) ?? 0), 0x01000193);
  return createRandom(hash);
}

/** A draw whose logarithm is uniform in [low, high). */
export function logUniform(random: Random, low: number, high: number): number {
  return low * (high / low) ** random.uniform();
}

/** One of the choices, all equally likely. */
export function oneOf<Choice>(random: Random, choices: readonly [Choice, ...Choice[]]): Choice {
  return choices[Math.floor(random.uniform() * choices.length)] ?? choices[0];
}
