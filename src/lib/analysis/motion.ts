import { FRAME_SECONDS } from '#lib/signal/lineMap.ts';
import type { EventTrack } from '#lib/signal/eventTrack.ts';
import { quantile } from '#lib/statistics/quantiles.ts';
import type { Motion } from './reading.ts';

/** Range of the middle 90 % of the speed, relative to the median, up to which a shaft counts as steady. */
const STEADY_SPREAD = 0.012;
/** A stop lasts at least this long, and stops make up at least this part of the time between first and last motion. */
const SHORTEST_STOP_SECONDS = 0.4;
const LEAST_STOPPED_FRACTION = 0.05;
const LOW_QUANTILE = 0.05;
const HIGH_QUANTILE = 0.95;

/** How the shaft moved while it was heard. @param track at least one active knot */
export function motionOf(track: EventTrack): Exclude<Motion, 'none'> {
  if (stoppedFraction(track.isActive) > LEAST_STOPPED_FRACTION) return 'intermittent';
  return speedSpread(track) < STEADY_SPREAD ? 'steady' : 'varying';
}

/** Range of the middle 90 % of the active speeds over their median. */
export function speedSpread(track: EventTrack): number {
  const active = activeRates(track);
  return (quantile(active, HIGH_QUANTILE) - quantile(active, LOW_QUANTILE)) / quantile(active, 0.5);
}

/** Event rates at the knots where events are heard, Hz. */
export function activeRates({ eventHz, isActive }: EventTrack): Float64Array {
  return eventHz.filter((_, knot) => isActive[knot] === 1);
}

/** Part of the time between the first and the last motion that lies in stops. */
function stoppedFraction(isActive: Uint8Array): number {
  const first = isActive.indexOf(1);
  const last = isActive.lastIndexOf(1);
  const shortest = Math.round(SHORTEST_STOP_SECONDS / FRAME_SECONDS);
  let stopped = 0;
  let run = 0;
  for (let knot = first; knot <= last; knot++) {
    if (isActive[knot] === 1) {
      if (run >= shortest) stopped += run;
      run = 0;
    } else {
      run++;
    }
  }
  return stopped / Math.max(1, last - first + 1);
}
