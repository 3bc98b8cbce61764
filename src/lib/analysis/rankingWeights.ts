import type { DomainFeatures } from './hypothesisFeatures.ts';
import type { FamilyQuality } from './soundFamily.ts';

/**
 * Weights of the evidence, in logits per unit of the feature.
 *
 * Provenance: conditional logit with a quadratic penalty of 3 on standardised weights, fitted on 600 seeded synthetic
 * recordings of nineteen classes (contacts, ripple of 3, 5 and 7 segments, fans, gears, brushless, run-ups, wobble,
 * stops, hum, music, speech, wind, a second motor, faint, clipped, 8 kHz, slow). No real recording took part.
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
