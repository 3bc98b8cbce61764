import type { DomainFeatures } from './hypothesisFeatures.ts';
import type { FamilyQuality } from './soundFamily.ts';

/**
 * Weights of the evidence, in logits per unit of the feature.
 *
 * Provenance: conditional logit with a quadratic penalty of 3 on standardised weights, fitted on 300 seeded synthetic
 * recordings of nineteen classes (contacts, ripple of 3, 5 and 7 segments, fans, gears, brushless, run-ups, wobble,
 * stops, hum, music, speech, wind, a second motor, faint, clipped, 8 kHz, slow). No real recording took part.
 */
export const DOMAIN_WEIGHTS: Readonly<Record<'waveform' | 'envelope', Readonly<Record<keyof DomainFeatures, number>>>> =
  {
    waveform: {
      eventLevel: 0.5057,
      hitFraction: 2.002,
      eventAlternation: -0.3012,
      shaftAlternation: -0.3349,
      betweenRatio: -0.5956,
      betweenEvenness: -0.2243,
      strayLevel: -0.1562,
      strayShaftLevel: -0.6038,
      unexplainedShare: -2.31,
      eventShare: -2.742,
      strongestIsEvent: 0.7997,
      shaftShare: 4.275,
    },
    envelope: {
      eventLevel: -0.1595,
      hitFraction: 0.4596,
      eventAlternation: -0.4696,
      shaftAlternation: -0.2907,
      betweenRatio: -0.498,
      betweenEvenness: -2.086,
      strayLevel: -0.2526,
      strayShaftLevel: -0.6278,
      unexplainedShare: -2.307,
      eventShare: 0.8175,
      strongestIsEvent: 1.532,
      shaftShare: 2.739,
    },
  };

/** Logits per unit of a family's quality: they decide between families, not within one. */
export const QUALITY_WEIGHTS: Readonly<Record<keyof FamilyQuality, number>> = {
  pathScore: 0.03962,
  activeFraction: 1.022,
  restlessness: -6.47,
  coherence: 0.4173,
};

/** Logits per unit of the mean comb score along the path. */
export const PATH_SCORE_WEIGHT = 0.261;
/** Logits per octave of shaft speed, and per octave squared, about the typical speed. */
export const SPEED_WEIGHT = 0.1436;
export const SPEED_CURVATURE_WEIGHT = -0.05785;
