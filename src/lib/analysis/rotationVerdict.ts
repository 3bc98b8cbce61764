import { isMainsMultiple } from '#lib/signal/mainsHum.ts';
import type { MainsHum } from '#lib/signal/mainsHum.ts';
import type { ShaftSearch } from './findShaft.ts';
import { speedSpread } from './motion.ts';
import type { RankedHypothesis } from './rankHypotheses.ts';
import type { NoRotationReason } from './reading.ts';

/** Whether anything turns, by how improbable its lines are in noise and by what shafts can do. */
export interface RotationVerdict {
  /** Null when something turns. */
  readonly reason: NoRotationReason | null;
  /** Evidence against mere noise, see `significance`; compared with `LEAST_SIGNIFICANCE`. */
  readonly significance: number;
}

/**
 * Evidence that noise exceeds in one recording of a thousand.
 *
 * Provenance: the evidence of the best hypothesis in seeded noise (white, pink, wind; 4 to 12 s; 1 to 14 events a
 * turn; the whole range of speeds) follows a Gumbel distribution; this is its quantile at 0.999.
 */
export const LEAST_SIGNIFICANCE = 2.4;
/** Weight of the weaker of the two domains. */
const WEAKER_DOMAIN_WEIGHT = 0.5;
/** Part of the line strength on mains multiples above which the whole comb is hum. */
const HUM_SHARE = 0.8;
/** Hum is as steady as the grid; what a track of its weakened lines scatters stays below this. */
const HUM_SPREAD = 5e-3;
/** Change of slope, per cent a frame, above which no shaft with inertia makes the track. */
const LARGEST_RESTLESSNESS = 1.2;
/** Periods of the event rate that must fit into the recording. */
const LEAST_EVENTS = 3;

/** @param durationSeconds length of the analysed stretch */
export function rotationVerdict(
  search: ShaftSearch,
  durationSeconds: number,
  isBadlyClipped: boolean,
): RotationVerdict {
  const best = search.ranked[0];
  if (!best) return { reason: 'nothing-periodic', significance: 0 };
  const value = significance(best);
  const reason = refusal(search, best, value, durationSeconds);
  return { reason: reason === 'nothing-periodic' && isBadlyClipped ? 'clipped' : reason, significance: value };
}

function refusal(
  { hum }: ShaftSearch,
  best: RankedHypothesis,
  value: number,
  durationSeconds: number,
): NoRotationReason | null {
  if (durationSeconds * best.family.trackedHz * best.ratio < LEAST_EVENTS) return 'too-short';
  if (hum && isHumAlone(best, hum, durationSeconds)) return 'hum';
  if (value < LEAST_SIGNIFICANCE) return 'nothing-periodic';
  if (best.family.quality.restlessness > LARGEST_RESTLESSNESS) return 'speech';
  return null;
}

/**
 * Evidence against noise: mean level of the event orders in the clearer domain, half that of the other, and the
 * logarithm of how coherent the lines are; nepers.
 */
export function significance({ waveform, envelope, family }: RankedHypothesis): number {
  const [weaker, clearer] = [waveform.eventLevel, envelope.eventLevel].sort((a, b) => a - b) as [number, number];
  return clearer + WEAKER_DOMAIN_WEIGHT * weaker + family.quality.coherence;
}

/** Whether nothing but the mains and its beats was found. */
function isHumAlone({ family }: RankedHypothesis, hum: MainsHum, durationSeconds: number): boolean {
  if (speedSpread(family.refined.track) > HUM_SPREAD) return false;
  let total = Number.MIN_VALUE;
  let onGrid = 0;
  for (const { order, level } of [...family.waveformPeaks, ...family.envelopePeaks]) {
    total += level;
    if (isMainsMultiple(hum, order * family.trackedHz, 2 / durationSeconds)) onGrid += level;
  }
  return onGrid > HUM_SHARE * total;
}
