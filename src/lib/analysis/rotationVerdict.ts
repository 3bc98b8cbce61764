import { isMainsMultiple } from '#lib/signal/mainsHum.ts';
import type { MainsHum } from '#lib/signal/mainsHum.ts';
import { phaseSlope } from '#lib/signal/phaseSlope.ts';
import type { ShaftSearch } from './findShaft.ts';
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
 * Evidence that noise exceeds in less than one recording of a thousand.
 *
 * Provenance: the evidence of the best hypothesis in 240 seeded noises (white, pink, wind; 2 to 10 s; 1 to 14 events a
 * turn; the whole range of speeds) has mean 0.53 and deviation 0.28; the Gumbel distribution with these has its
 * quantile at 0.9999 here, that of wind alone at 0.9993.
 */
export const LEAST_SIGNIFICANCE = 2.4;
/** Weight of the weaker of the two domains. */
const WEAKER_DOMAIN_WEIGHT = 0.5;
/** Part of the main lines on mains multiples above which the whole sound is hum. */
const HUM_SHARE = 0.8;
/** Lines within this many nepers of the strongest are main lines; what is weaker may be their skirts. */
const MAIN_LINE_NEPERS = 5;
/** How near an event rate must come to a multiple of the mains to be hum itself. */
const HUM_TOLERANCE = 8e-4;
/** Phase scatter of the event rate about a straight line, cycles: the grid keeps time far better than any motor. */
const HUM_SCATTER_CYCLES = 0.005;
/** Change of slope, per cent a frame, above which no shaft with inertia makes the track. */
const LARGEST_RESTLESSNESS = 0.6;
/** A voice moves from frame to frame more often than this; a tune stands still between its jumps. */
const GLIDING_FRACTION = 0.17;
/** Coherence of the lines of a voice, which no noise reaches. */
const VOICED_COHERENCE = 1.1;
/** Hands and feet knock up to this fast, and far less evenly than a shaft turns. */
const FASTEST_HAND_HZ = 2.7;
/** Coherence that the even rhythm of a shaft reaches and footsteps do not. */
const EVEN_RHYTHM_COHERENCE = 1.7;
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
  const { quality, trackedHz, path } = best.family;
  const eventHz = trackedHz * best.ratio;
  if (durationSeconds * eventHz < LEAST_EVENTS) return 'too-short';
  if (hum && isHumAlone(best, hum)) return 'hum';
  if (quality.restlessness > LARGEST_RESTLESSNESS) {
    return quality.coherence > VOICED_COHERENCE && isGliding(path.cells) ? 'speech' : 'nothing-periodic';
  }
  if (value < LEAST_SIGNIFICANCE) return 'nothing-periodic';
  const isHandMade = eventHz < FASTEST_HAND_HZ && quality.coherence < EVEN_RHYTHM_COHERENCE;
  return isHandMade ? 'nothing-periodic' : null;
}

/**
 * Evidence against noise: mean level of the event orders in the clearer domain, half that of the other, and the
 * logarithm of how coherent the lines are; nepers.
 */
export function significance({ waveform, envelope, family }: RankedHypothesis): number {
  const [weaker, clearer] = [waveform.eventLevel, envelope.eventLevel].sort((a, b) => a - b) as [number, number];
  return clearer + WEAKER_DOMAIN_WEIGHT * weaker + family.quality.coherence;
}

/** Whether nothing but the mains was found: the event rate and nearly all main lines are multiples of it, as steady as the grid. */
function isHumAlone({ family, ratio }: RankedHypothesis, hum: MainsHum): boolean {
  const eventHz = family.trackedHz * ratio;
  if (!isMainsMultiple(hum, eventHz, HUM_TOLERANCE * eventHz)) return false;
  const slope = phaseSlope(family.refined, 0, family.refined.grid.blockCount);
  if (slope && slope.scatterCycles * ratio > HUM_SCATTER_CYCLES) return false;
  let total = 0;
  let onGrid = 0;
  for (const peaks of [family.waveformPeaks, family.envelopePeaks]) {
    for (const { order, level } of peaks) {
      if (level < (peaks[0]?.level ?? 0) - MAIN_LINE_NEPERS) continue;
      total++;
      if (isMainsMultiple(hum, order * family.trackedHz, HUM_TOLERANCE * order * family.trackedHz)) onGrid++;
    }
  }
  return onGrid > HUM_SHARE * total;
}

/** Whether a path moves from one frame to the next in many frames rather than in a few jumps. */
function isGliding(cells: Int32Array): boolean {
  let moves = 0;
  let steps = 0;
  for (let frame = 1; frame < cells.length; frame++) {
    const [before, here] = [cells[frame - 1] as number, cells[frame] as number];
    if (before < 0 || here < 0) continue;
    steps++;
    if (before !== here) moves++;
  }
  return moves > GLIDING_FRACTION * steps;
}
