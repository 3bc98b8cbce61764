/** Sounds of a room that are no motor: what a phone also hears. Each returns root mean square 1, shape [sampleCount]. */
import { bandPassBiquad, filterInPlace } from '#lib/signal/biquad.ts';
import type { Random } from '#lib/signal/synthesis/random.ts';
import { excite } from '#lib/signal/synthesis/resonance.ts';
import { logUniform, oneOf } from './trialRecording.ts';

export interface RoomSoundOptions {
  readonly sampleCount: number;
  readonly sampleRateHz: number;
  readonly random: Random;
}

export type RoomSound = (options: RoomSoundOptions) => Float64Array;

/** Notes of six harmonics on a tempered scale, struck and dying away, two or three at a time. */
export function music({ sampleCount, sampleRateHz, random }: RoomSoundOptions): Float64Array {
  const sound = new Float64Array(sampleCount);
  const rootHz = logUniform(random, 110, 330);
  const beatSeconds = random.between(0.2, 0.6);
  for (let start = 0; start < sampleCount;) {
    const seconds = beatSeconds * oneOf(random, [1, 2, 3]);
    for (let voice = oneOf(random, [2, 3]); voice > 0; voice--) {
      const noteHz = rootHz * 2 ** (Math.floor(random.between(-5, 12)) / 12);
      addNote(sound, { start, seconds, noteHz, level: random.between(0.3, 1), sampleRateHz });
    }
    start += Math.round(seconds * sampleRateHz);
  }
  return atUnitLevel(sound);
}

function addNote(
  sound: Float64Array,
  note: { start: number; seconds: number; noteHz: number; level: number; sampleRateHz: number },
): void {
  const end = Math.min(sound.length, note.start + note.seconds * note.sampleRateHz);
  for (let sample = note.start; sample < end; sample++) {
    const time = (sample - note.start) / note.sampleRateHz;
    const strength = note.level * Math.min(1, time / 0.02) * Math.exp(-time / (0.8 * note.seconds));
    for (let harmonic = 1; harmonic <= 6; harmonic++) {
      sound[sample] =
        (sound[sample] ?? 0) + (strength / harmonic) * Math.cos(2 * Math.PI * harmonic * note.noteHz * time);
    }
  }
}

/** Syllables, two thirds of them voiced with a gliding pitch, through two formants. */
export function voice({ sampleCount, sampleRateHz, random }: RoomSoundOptions): Float64Array {
  const source = new Float64Array(sampleCount);
  for (let start = 0; start < sampleCount;) {
    const length = Math.round(random.between(0.08, 0.35) * sampleRateHz);
    const isVoiced = random.uniform() < 0.65;
    const pitchHz = logUniform(random, 90, 240);
    const glide = random.between(-0.3, 0.3);
    let cycles = 0;
    for (let inside = 0; inside < length && start + inside < sampleCount; inside++) {
      const part = inside / length;
      cycles += (pitchHz * (1 + glide * part)) / sampleRateHz;
      // The pulse of the glottis: a sharp closing once a period.
      source[start + inside] = Math.sin(Math.PI * part) * (isVoiced ? 1 - 2 * (cycles % 1) : 0.3 * random.normal());
    }
    start += length + (random.uniform() < 0.25 ? Math.round(random.between(0.1, 0.5) * sampleRateHz) : 0);
  }
  const formants = [
    { frequencyHz: random.between(400, 800), quality: 3 },
    { frequencyHz: random.between(1200, 2300), quality: 5 },
  ].map((formant) => filterInPlace(source.slice(), [bandPassBiquad({ ...formant, sampleRateHz })]));
  return atUnitLevel(source.map((_, sample) => formants.reduce((sum, formant) => sum + (formant[sample] ?? 0), 0)));
}

/** Four voices at once. */
export function babble(options: RoomSoundOptions): Float64Array {
  const voices = Array.from({ length: 4 }, () => voice(options));
  return atUnitLevel(
    new Float64Array(options.sampleCount).map((_, sample) =>
      voices.reduce((sum, each) => sum + (each[sample] ?? 0), 0),
    ),
  );
}

/** Knocks at random times. */
export function taps({ sampleCount, sampleRateHz, random }: RoomSoundOptions): Float64Array {
  const perSecond = random.between(0.5, 4);
  const times = Array.from(
    { length: Math.ceil((perSecond * sampleCount) / sampleRateHz) },
    () => random.uniform() * sampleCount,
  );
  return knocks(times, { sampleCount, sampleRateHz, random });
}

/** Steps about two a second with 5 % scatter. */
export function footsteps({ sampleCount, sampleRateHz, random }: RoomSoundOptions): Float64Array {
  const stepSeconds = random.between(0.45, 0.7);
  const times: number[] = [];
  for (let time = random.uniform() * stepSeconds; time * sampleRateHz < sampleCount;) {
    times.push(time * sampleRateHz);
    time += stepSeconds * (1 + 0.05 * random.normal());
  }
  return knocks(times, { sampleCount, sampleRateHz, random });
}

/** Thirty to two hundred drops a second. */
export function rain({ sampleCount, sampleRateHz, random }: RoomSoundOptions): Float64Array {
  const perSecond = random.between(30, 200);
  const times = Array.from(
    { length: Math.ceil((perSecond * sampleCount) / sampleRateHz) },
    () => random.uniform() * sampleCount,
  );
  return knocks(times, { sampleCount, sampleRateHz, random });
}

function knocks(positions: readonly number[], { sampleCount, sampleRateHz, random }: RoomSoundOptions): Float64Array {
  const impulses = new Float64Array(sampleCount);
  for (const position of positions) impulses[Math.floor(position)] = logUniform(random, 0.1, 1);
  const sound = new Float64Array(sampleCount);
  const modes = Array.from({ length: 3 }, () => ({
    frequencyHz: logUniform(random, 100, 3000),
    quality: logUniform(random, 3, 12),
    gain: 1,
  }));
  excite(sound, impulses, modes, sampleRateHz);
  return atUnitLevel(sound);
}

/** Root mean square of samples. */
export function levelOf(samples: Float64Array | Float32Array): number {
  let power = 0;
  for (const value of samples) power += value * value;
  return Math.sqrt(power / Math.max(1, samples.length));
}

function atUnitLevel(sound: Float64Array): Float64Array {
  const level = levelOf(sound);
  return level > 0 ? sound.map((value) => value / level) : sound;
}

/** Adds a sound at a level to samples, in place, and clips as a converter does. */
export function addRoomSound(samples: Float32Array, sound: Float64Array, level: number): void {
  for (let sample = 0; sample < samples.length; sample++) {
    const sum = (samples[sample] as number) + level * (sound[sample] as number);
    samples[sample] = Math.max(-1, Math.min(1, sum));
  }
}
