import { knotSeconds } from '#lib/signal/eventTrack.ts';
import type { EventTrack } from '#lib/signal/eventTrack.ts';
import { rpmFromEventHertz } from '#lib/units/rotation.ts';
import type { Series } from '../series.ts';

/** Part of a window's movement that its one figure may be off by. */
const MOVEMENT_FRACTION = 0.5;

/**
 * The shaft speed over time, ten points a second; NaN where nothing turns or is heard.
 *
 * @param options tracked cycles per turn of the shaft, the sample clock's factor, the relative uncertainty of the
 *   steady part, and the time at which the track starts in the recording
 */
export function trendSeries(
  track: EventTrack,
  options: {
    readonly cyclesPerTurn: number;
    readonly clockFactor: number;
    readonly relativeUncertainty: number;
    readonly startSeconds: number;
  },
): Series {
  const count = track.eventHz.length;
  const [timeSeconds, shaftSpeedRpm, lowRpm, highRpm] = Array.from({ length: 4 }, () =>
    new Float32Array(count).fill(Number.NaN),
  ) as [Float32Array, Float32Array, Float32Array, Float32Array];
  for (let knot = 0; knot < count; knot++) {
    timeSeconds[knot] = options.startSeconds + knotSeconds(knot);
    if (track.isActive[knot] !== 1) continue;
    const hertz = track.eventHz[knot] as number;
    const movement = Math.abs((track.eventHz[knot + 1] ?? hertz) - (track.eventHz[knot - 1] ?? hertz)) / hertz / 2;
    const speed = rpmFromEventHertz(hertz, options.cyclesPerTurn) * options.clockFactor;
    const relative = Math.hypot(options.relativeUncertainty, MOVEMENT_FRACTION * movement);
    shaftSpeedRpm[knot] = speed;
    lowRpm[knot] = speed * (1 - relative);
    highRpm[knot] = speed * (1 + relative);
  }
  return {
    name: 'trend',
    columns: [
      { name: 'timeSeconds', unit: 's', values: timeSeconds },
      { name: 'shaftSpeedRpm', unit: 'rpm', values: shaftSpeedRpm },
      { name: 'lowRpm', unit: 'rpm', values: lowRpm },
      { name: 'highRpm', unit: 'rpm', values: highRpm },
    ],
  };
}
