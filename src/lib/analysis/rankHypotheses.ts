import type { CombScores } from '#lib/signal/combScore.ts';
import { rpmFromEventHertz } from '#lib/units/rotation.ts';
import { domainFeatures } from './hypothesisFeatures.ts';
import type { DomainFeatures } from './hypothesisFeatures.ts';
import { ratioHypotheses } from './hypotheses.ts';
import {
  DOMAIN_WEIGHTS,
  PATH_SCORE_WEIGHT,
  QUALITY_WEIGHTS,
  SPEED_CURVATURE_WEIGHT,
  SPEED_WEIGHT,
} from './rankingWeights.ts';
import type { AnalysisSettings } from './settings.ts';
import { pathScoreAt } from './soundFamily.ts';
import type { SoundFamily } from './soundFamily.ts';

/** One speed that the sound could mean, with its evidence. */
export interface RankedHypothesis {
  readonly family: SoundFamily;
  /** Event rate over the tracked rate of the family. */
  readonly ratio: number;
  /** Median shaft speed while turning, rpm, by the recording's own clock. */
  readonly shaftSpeedRpm: number;
  readonly waveform: DomainFeatures;
  readonly envelope: DomainFeatures;
  readonly pathScore: number;
  /** Probability among all hypotheses, [0, 1]; they sum to 1. */
  readonly probability: number;
}

/** Speeds nearer than this are the same answer, whichever family and ratio they came from. */
const SAME_SPEED = 0.006;
/** A range is entered to the nearest round figure: this much beyond its ends is still inside. */
const RANGE_SLACK = 0.005;
/** Speed about which small motors scatter on a logarithmic scale. */
const TYPICAL_RPM = 2500;

/**
 * Weighs every ratio of every family against all others.
 *
 * @returns merged hypotheses, most probable first; empty when none lies in the range
 * Reference: conditional logit, D. McFadden (1974), Conditional logit analysis of qualitative choice behavior.
 */
export function rankHypotheses(
  families: readonly SoundFamily[],
  combs: CombScores,
  settings: AnalysisSettings,
): RankedHypothesis[] {
  const scored = families.flatMap((family) => hypothesesOf(family, combs, settings));
  const highest = Math.max(...scored.map(({ score }) => score));
  const total = scored.reduce((sum, { score }) => sum + Math.exp(score - highest), 0);
  const ranked = scored
    .map(({ score, hypothesis }) => ({
      ...hypothesis,
      probability: Math.exp(score - highest) / total,
    }))
    .sort((a, b) => b.probability - a.probability);
  return merged(ranked);
}

function hypothesesOf(
  family: SoundFamily,
  combs: CombScores,
  settings: AnalysisSettings,
): { score: number; hypothesis: Omit<RankedHypothesis, 'probability'> }[] {
  const { eventsPerTurn, orders } = settings;
  return ratioHypotheses(eventsPerTurn).flatMap((ratio) => {
    const shaftSpeedRpm = rpmFromEventHertz(family.trackedHz * ratio, eventsPerTurn);
    if (shaftSpeedRpm < settings.minimumRpm * (1 - RANGE_SLACK)) return [];
    if (shaftSpeedRpm > settings.maximumRpm * (1 + RANGE_SLACK)) return [];
    const form = {
      ratio,
      eventsPerTurn,
      expectedOrders: orders.filter((order) => order !== eventsPerTurn),
    };
    const hypothesis = {
      family,
      ratio,
      shaftSpeedRpm,
      waveform: domainFeatures(family.spectra.waveform, family.waveformPeaks, form),
      envelope: domainFeatures(family.spectra.envelope, family.envelopePeaks, form),
      pathScore: pathScoreAt(family.path, combs, ratio),
    };
    return [{ score: scoreOf(hypothesis), hypothesis }];
  });
}

function scoreOf(hypothesis: Omit<RankedHypothesis, 'probability'>): number {
  const octaves = Math.log2(hypothesis.shaftSpeedRpm / TYPICAL_RPM);
  return (
    PATH_SCORE_WEIGHT * hypothesis.pathScore +
    SPEED_WEIGHT * octaves +
    SPEED_CURVATURE_WEIGHT * octaves * octaves +
    weighted(DOMAIN_WEIGHTS.waveform, hypothesis.waveform) +
    weighted(DOMAIN_WEIGHTS.envelope, hypothesis.envelope) +
    weighted(QUALITY_WEIGHTS, hypothesis.family.quality)
  );
}

function weighted<Name extends string>(
  weights: Readonly<Record<Name, number>>,
  features: Readonly<Record<Name, number>>,
): number {
  let sum = 0;
  for (const name of Object.keys(weights) as Name[]) sum += weights[name] * features[name];
  return sum;
}

function merged(ranked: readonly RankedHypothesis[]): RankedHypothesis[] {
  const answers: RankedHypothesis[] = [];
  for (const hypothesis of ranked) {
    const same = answers.findIndex(
      (answer) => Math.abs(answer.shaftSpeedRpm / hypothesis.shaftSpeedRpm - 1) < SAME_SPEED,
    );
    const known = answers[same];
    if (known)
      answers[same] = {
        ...known,
        probability: known.probability + hypothesis.probability,
      };
    else answers.push(hypothesis);
  }
  return answers.sort((a, b) => b.probability - a.probability);
}
