import type { Random } from '#lib/signal/synthesis/random.ts';
import type { Resonance } from '#lib/signal/synthesis/resonance.ts';
import type { MotorSoundOptions } from '#lib/signal/synthesis/synthesiseMotor.ts';
import { logUniform, oneOf } from './trialRecording.ts';

/** A motor drawn at random from its kind. */
export interface DrawnMotor {
  readonly eventsPerTurn: number;
  readonly shaftSpeedRpm: number;
  readonly sound: Pick<MotorSoundOptions, 'contacts' | 'shaftTones' | 'fixedTones'>;
}

/** A kind of motor. */
export type MotorDraw = (random: Random) => DrawnMotor;

function drawResonances(random: Random): Resonance[] {
  const count = oneOf(random, [3, 4, 5, 6]);
  return Array.from({ length: count }, () => ({
    frequencyHz: logUniform(random, 350, 9000),
    quality: logUniform(random, 3, 25),
    gain: random.between(0.3, 1),
  }));
}

/** Hand-made commutators: strength to 1:4, spacing uneven up to 12 %, some with clicks missing. */
export function twoContacts(slowestRpm: number, fastestRpm: number): MotorDraw {
  return (random) => ({
    eventsPerTurn: 2,
    shaftSpeedRpm: logUniform(random, slowestRpm, fastestRpm),
    sound: {
      contacts: [
        {
          perTurn: 2,
          amplitude: random.between(0.1, 0.35),
          strengthUnevenness: random.between(0, 0.75),
          spacingUnevenness: random.between(0, 0.12),
          jitter: logUniform(random, 0.001, 0.02),
          missingFraction: random.uniform() < 0.3 ? random.between(0, 0.06) : 0,
          resonances: drawResonances(random),
        },
      ],
    },
  });
}

/** Brushed motors under two brushes; a third of them also sound at half the ripple. */
export function commutator(segmentCount: number): MotorDraw {
  const eventsPerTurn = 2 * segmentCount;
  return (random) => ({
    eventsPerTurn,
    shaftSpeedRpm: logUniform(random, 1000, 20_000),
    sound: {
      contacts: [
        {
          perTurn: eventsPerTurn,
          amplitude: random.between(0, 0.12),
          strengthUnevenness: random.between(0, 0.7),
          spacingUnevenness: random.between(0, 0.08),
          jitter: logUniform(random, 0.001, 0.03),
          missingFraction: 0,
          resonances: drawResonances(random),
        },
      ],
      shaftTones: [
        drawTones(random, eventsPerTurn, { amplitude: [0.01, 0.12], modulationDepth: 0.4 }),
        drawTones(random, 1, { amplitude: [0, 0.06], modulationDepth: 0 }),
        ...(random.uniform() < 0.35
          ? [drawTones(random, segmentCount, { amplitude: [0, 0.04], modulationDepth: 0 })]
          : []),
      ],
    },
  });
}

/** Fans and propellers of two to nine blades. */
export function fan(random: Random): DrawnMotor {
  const bladeCount = oneOf(random, [2, 3, 4, 5, 6, 7, 8, 9]);
  return {
    eventsPerTurn: bladeCount,
    shaftSpeedRpm: logUniform(random, 500, 12_000),
    sound: {
      shaftTones: [
        drawTones(random, bladeCount, { amplitude: [0.03, 0.15], modulationDepth: 0.35 }),
        drawTones(random, 1, { amplitude: [0, 0.08], modulationDepth: 0 }),
      ],
    },
  };
}

/** The mesh of a wheel of eight to twenty teeth. */
export function gear(random: Random): DrawnMotor {
  const toothCount = 8 + Math.floor(13 * random.uniform());
  return {
    eventsPerTurn: toothCount,
    shaftSpeedRpm: logUniform(random, 300, 6000),
    sound: {
      contacts: [
        {
          perTurn: toothCount,
          amplitude: random.between(0.02, 0.1),
          strengthUnevenness: random.between(0, 0.5),
          spacingUnevenness: random.between(0, 0.05),
          jitter: logUniform(random, 0.002, 0.03),
          missingFraction: 0,
          resonances: drawResonances(random),
        },
      ],
      shaftTones: [drawTones(random, toothCount, { amplitude: [0.02, 0.08], modulationDepth: 0.5 })],
    },
  };
}

/** Brushless motors of one to seven pole pairs, with a regulator's whine that does not follow the speed. */
export function brushless(random: Random): DrawnMotor {
  const polePairCount = oneOf(random, [1, 2, 3, 4, 7]);
  const ripplesPerTurn = 6 * polePairCount;
  return {
    eventsPerTurn: ripplesPerTurn,
    shaftSpeedRpm: logUniform(random, 800, 15_000),
    sound: {
      shaftTones: [
        drawTones(random, ripplesPerTurn, { amplitude: [0.03, 0.12], modulationDepth: 0.2 }),
        drawTones(random, 2 * polePairCount, { amplitude: [0, 0.05], modulationDepth: 0 }),
        drawTones(random, 1, { amplitude: [0, 0.05], modulationDepth: 0 }),
      ],
      fixedTones: [
        { frequencyHz: random.between(6000, 14_000), amplitude: random.between(0.01, 0.08), harmonicCount: 1 },
      ],
    },
  };
}

/** Any of the kinds above. */
export function anyMotor(random: Random): DrawnMotor {
  return oneOf<MotorDraw>(random, [twoContacts(200, 1800), commutator(3), commutator(5), fan, gear])(random);
}

function drawTones(
  random: Random,
  perTurn: number,
  range: { readonly amplitude: readonly [number, number]; readonly modulationDepth: number },
) {
  return {
    perTurn,
    amplitude: random.between(...range.amplitude),
    harmonicCount: oneOf(random, [2, 3, 4, 5, 6, 7]),
    slopeDecibelsPerOctave: random.between(3, 9),
    modulationDepth: random.between(0, range.modulationDepth),
  };
}
