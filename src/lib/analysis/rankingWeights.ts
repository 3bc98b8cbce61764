import type { DomainFeatures } from './hypothesisFeatures.ts';
import type { FamilyQuality } from './soundFamily.ts';

/**
 * Weights of the evidence, in logits per unit of the feature.
 *
 * Provenance: conditional logit with a quadratic penalty of 3 on standardised weights, minimised with L-BFGS (SciPy),
 * on the features of 600 seeded synthetic recordings (seeds 0 to 599, 4 to 12 s, classes in turn: contacts, ripple of
 * 3, 5 and 7 segments, fan, gear, brushless, run-up or coast-down, wobble, stop, hum, music, speech, wind, second
 * motor, faint, clipped, 8 and 16 kHz, slow). They came from `synthesiseMotor`, as those of `npm run trials` do, but
 * were drawn by another program with other ranges, which is not part of the project: no command here fits these
 * numbers again. No real recording and no seed of the trials took part. Five-fold cross-validation: 571 of 600 right.
 */
export const DOMAIN_WEIGHTS: Readonly<Record<'waveform' | 'envelope', Readonly<Record<keyof DomainFeatures, number>>>> =
  {
    waveform: {
      eventLevel: 0.5505,
      hitFraction: 1.243,
      eventAlternation: -0.3757,
      shaftAlternation: -0.39,
      betweenRatio: -0.2193,
      betweenEvenness: -0.4373,
      strayLevel: -0.1357,
      strayShaftLevel: -0.842,
      unexplainedShare: -2.838,
      eventShare: -3.227,
      strongestIsEvent: 0.1701,
      shaftShare: 3.967,
    },
    envelope: {
      eventLevel: -0.2354,
      hitFraction: 0.866,
      eventAlternation: -0.6701,
      shaftAlternation: -0.3815,
      betweenRatio: -0.7795,
      betweenEvenness: -2.004,
      strayLevel: -0.3953,
      strayShaftLevel: -0.7769,
      unexplainedShare: -2.501,
      eventShare: 1.052,
      strongestIsEvent: 1.446,
      shaftShare: 3.372,
    },
  };

/** Logits per unit of a family's quality: they decide between families, not within one. */
export const QUALITY_WEIGHTS: Readonly<Record<keyof FamilyQuality, number>> = {
  pathScore: 0.0938,
  activeFraction: -1.771,
  restlessness: -5.98,
  coherence: 0.3662,
};

/** Logits per unit of the mean comb score along the path. */
export const PATH_SCORE_WEIGHT = 0.3097;
/** Logits per octave of shaft speed, and per octave squared, about the typical speed. */
export const SPEED_WEIGHT = 0.07082;
export const SPEED_CURVATURE_WEIGHT = -0.05416;
