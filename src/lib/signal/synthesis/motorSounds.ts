import type { MotorSoundOptions } from './synthesiseMotor.ts';
import { TABLE_TOP_RESONANCES } from './resonance.ts';

/** The parts of a synthetic recording that differ between kinds of motor. */
export type MotorSound = Pick<MotorSoundOptions, 'contacts' | 'shaftTones'>;

/** A hand-made motor: two uneven contacts that click and make the table ring. */
export function twoContactSound(unevenness = 0.4): MotorSound {
  return {
    contacts: [
      {
        perTurn: 2,
        amplitude: 0.25,
        strengthUnevenness: unevenness,
        spacingUnevenness: unevenness / 8,
        jitter: 0.006,
        missingFraction: 0,
        resonances: TABLE_TOP_RESONANCES,
      },
    ],
  };
}

/**
 * A brushed motor with a commutator: a ripple with harmonics, a little contact noise and the shaft's unbalance.
 *
 * @param ripplesPerTurn lcm(poles, segments): 6, 10 or 14 for 3, 5 or 7 segments under two brushes
 */
export function commutatorSound(ripplesPerTurn: number): MotorSound {
  return {
    contacts: [
      {
        perTurn: ripplesPerTurn,
        amplitude: 0.04,
        strengthUnevenness: 0.3,
        spacingUnevenness: 0.02,
        jitter: 0.01,
        missingFraction: 0,
        resonances: TABLE_TOP_RESONANCES,
      },
    ],
    shaftTones: [
      {
        perTurn: ripplesPerTurn,
        amplitude: 0.08,
        harmonicCount: 6,
        slopeDecibelsPerOctave: 5,
        modulationDepth: 0.15,
      },
      {
        perTurn: 1,
        amplitude: 0.02,
        harmonicCount: 2,
        slopeDecibelsPerOctave: 8,
        modulationDepth: 0,
      },
    ],
  };
}

/** A fan or propeller: blade passing with harmonics, and the shaft's unbalance. */
export function fanSound(bladeCount: number): MotorSound {
  return {
    shaftTones: [
      {
        perTurn: bladeCount,
        amplitude: 0.12,
        harmonicCount: 5,
        slopeDecibelsPerOctave: 6,
        modulationDepth: 0.1,
      },
      {
        perTurn: 1,
        amplitude: 0.03,
        harmonicCount: 3,
        slopeDecibelsPerOctave: 6,
        modulationDepth: 0,
      },
    ],
  };
}
