import { colouredNoise, type NoiseColour } from '#lib/signal/synthesis/noise.ts';
import type { Random } from '#lib/signal/synthesis/random.ts';
import { synthesiseMotor } from '#lib/signal/synthesis/synthesiseMotor.ts';
import type { FixedTone } from '#lib/signal/synthesis/tonalParts.ts';
import { amplitudeFromDecibels } from '#lib/units/decibels.ts';
import { mainsHum } from './motorClasses.ts';
import { addRoomSound, babble, footsteps, music, rain, type RoomSound, taps, voice } from './roomSounds.ts';
import { classRandom, logUniform, oneOf, type TrialClass, type TrialRecording } from './trialRecording.ts';

/** A room without a motor. */
interface Room {
  readonly noise?: NoiseColour;
  readonly noiseDecibels?: readonly [number, number];
  readonly sound?: RoomSound;
  readonly fixedTones?: (random: Random) => FixedTone[];
}

const ROOMS: Readonly<Record<string, Room>> = {
  silence: {},
  'white noise': { noise: 'white', noiseDecibels: [-50, -14] },
  'pink noise': { noise: 'pink', noiseDecibels: [-50, -14] },
  wind: { noise: 'wind', noiseDecibels: [-50, -14] },
  'hum alone': { noise: 'pink', fixedTones: (random) => [mainsHum(random)] },
  'faint hum': { noise: 'pink', noiseDecibels: [-48, -44], fixedTones: faintHum },
  'tones on the grid': { noise: 'pink', fixedTones: tonesOnTheGrid },
  'a tone': {
    noise: 'pink',
    fixedTones: (random) => [{ frequencyHz: logUniform(random, 200, 4000), amplitude: 0.1, harmonicCount: 1 }],
  },
  taps: { noise: 'pink', sound: taps },
  footsteps: { noise: 'pink', sound: footsteps },
  rain: { noise: 'pink', sound: rain },
  'a voice': { noise: 'pink', sound: voice },
  babble: { noise: 'pink', sound: babble },
  music: { noise: 'pink', sound: music },
};

/** Recordings in which nothing turns, by class. */
export const MOTORLESS_CLASSES: readonly TrialClass[] = Object.entries(ROOMS).map(([name, room]) => ({
  name,
  hasMotor: false,
  make: (seed) => motorlessRecording(name, room, seed),
}));

const QUIET_ROOM_DECIBELS = [-55, -40] as const;
/** Events a turn that a person may have entered for the motor that does not run. */
const EVENTS_PER_TURN = [1, 2, 3, 6, 10, 14] as const;

function motorlessRecording(className: string, room: Room, seed: number): TrialRecording {
  const random = classRandom(className, seed);
  const sampleRateHz = oneOf(random, [48_000, 44_100, 16_000]);
  const eventsPerTurn = oneOf(random, EVENTS_PER_TURN);
  const { samples } = synthesiseMotor({
    seed: 0,
    durationSeconds: random.between(4, 9),
    sampleRateHz,
    speed: [{ timeSeconds: 0, shaftSpeedRpm: 0 }],
    fixedTones: room.fixedTones?.(random) ?? [],
  });
  const options = { sampleCount: samples.length, sampleRateHz, random };
  if (room.sound) addRoomSound(samples, room.sound(options), logUniform(random, 0.02, 0.2));
  if (room.noise) {
    const level = amplitudeFromDecibels(random.between(...(room.noiseDecibels ?? QUIET_ROOM_DECIBELS)));
    addRoomSound(samples, colouredNoise(room.noise, options), level);
  }
  return { className, seed, samples, sampleRateHz, settings: { eventsPerTurn }, truth: null };
}

/** A supply in the background: a few harmonics near the noise. */
function faintHum(random: Random): FixedTone[] {
  return [{ ...mainsHum(random), amplitude: logUniform(random, 0.002, 0.01), harmonicCount: 4 }];
}

/** A transformer: the first multiples of twice the mains frequency, each as loud as it likes. */
function tonesOnTheGrid(random: Random): FixedTone[] {
  const twiceMainsHz = 2 * mainsHum(random).frequencyHz;
  return [1, 2, 3].map((harmonic) => ({
    frequencyHz: harmonic * twiceMainsHz,
    amplitude: logUniform(random, 0.01, 0.1),
    harmonicCount: 1,
  }));
}
