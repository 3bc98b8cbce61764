import type { DomainFeatures } from './hypothesisFeatures.ts';

/**
 * Weights of the evidence, in logits per unit of the feature.
 *
 * Provenance: conditional logit with a quadratic penalty of 3 on standardised weights, fitted on 570 seeded synthetic
 * recordings of all classes.
 */
export const DOMAIN_WEIGHTS: Readonly<Record<'waveform' | 'envelope', Readonly<Record<keyof DomainFeatures, number>>>> =
  {
    waveform: {
      eventLevel: 0.8215,
      hitFraction: -0.0645,
      eventAlternation: -0.2895,
      shaftAlternation: -0.1926,
      eventContrast: 0,
    strayLevel: -0.1469,
      strayShaftLevel: -0.9377,
      unexplainedShare: -1.157,
      eventShare: -0.2288,
      strongestIsEvent: 0.0915,
      shaftShare: 3.302,
    },
    envelope: {
      eventLevel: -0.102,
      hitFraction: 0.7221,
      eventAlternation: -0.7873,
      shaftAlternation: -0.2753,
      eventContrast: 0,
    strayLevel: -0.08079,
      strayShaftLevel: -0.9279,
      unexplainedShare: -3.214,
      eventShare: 2.945,
      strongestIsEvent: 2.153,
      shaftShare: 0.4944,
    },
  };

/** Logits per unit of the mean comb score along the path. */
export const PATH_SCORE_WEIGHT = 0.2806;
/** Logits per octave of shaft speed, and per octave squared, about the typical speed. */
export const SPEED_WEIGHT = 0.54;
export const SPEED_CURVATURE_WEIGHT = -0.08924;
