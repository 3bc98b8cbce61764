import type { ShaftSearch } from './findShaft.ts';
import { isHumAlone } from './mainsEvidence.ts';
import type { RankedHypothesis } from './rankHypotheses.ts';
import type { NoRotationReason } from './reading.ts';
import { LEAST_SIGNIFICANCE, significance } from './significance.ts';

/** Whether anything turns, by how improbable its lines are in noise and by what shafts can do. */
export interface RotationVerdict {
  /** Null when something turns. */
  readonly reason: NoRotationReason | null;
  /** Evidence against mere noise, see `significance`; compared with `LEAST_SIGNIFICANCE`. */
  readonly significance: number;
}

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
  const reason = refusal(best, value, durationSeconds);
  return { reason: reason === 'nothing-periodic' && isBadlyClipped ? 'clipped' : reason, significance: value };
}

function refusal(best: RankedHypothesis, value: number, durationSeconds: number): NoRotationReason | null {
  const { quality, trackedHz, path } = best.family;
  const eventHz = trackedHz * best.ratio;
  if (durationSeconds * eventHz < LEAST_EVENTS) return 'too-short';
  if (isHumAlone(best)) return 'hum';
  if (quality.restlessness > LARGEST_RESTLESSNESS) {
    return quality.coherence > VOICED_COHERENCE && isGliding(path.cells) ? 'speech' : 'nothing-periodic';
  }
  if (value < LEAST_SIGNIFICANCE) return 'nothing-periodic';
  const isHandMade = eventHz < FASTEST_HAND_HZ && quality.coherence < EVEN_RHYTHM_COHERENCE;
  return isHandMade ? 'nothing-periodic' : null;
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
