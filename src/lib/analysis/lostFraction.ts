import type { EventTrack } from '#lib/signal/eventTrack.ts';
import type { SampledSignal } from '#lib/signal/frontEnd.ts';
import { FRAME_SECONDS } from '#lib/signal/lineMap.ts';
import { logPower } from '#lib/signal/logPower.ts';
import { median } from '#lib/statistics/quantiles.ts';

/** A frame this little below the usual level of the running motor, nepers of power, still holds its sound: 6.5 dB. */
const STILL_LOUD_NEPERS = 1.5;

/**
 * Part of a recording in which a track hears no events although the sound is as loud as where it does: the motor went
 * on, too fast in change to follow, and a median over the rest leaves that out.
 *
 * @param waveform the sound from which the track was made
 * @returns [0, 1]; 0 when the silent frames are quiet
 */
export function lostFraction({ isActive }: EventTrack, { samples, sampleRateHz }: SampledSignal): number {
  const frameSamples = Math.round(FRAME_SECONDS * sampleRateHz);
  const power = Float64Array.from(isActive, (_, frame) => {
    const stretch = samples.subarray(frame * frameSamples, (frame + 1) * frameSamples);
    return stretch.reduce((sum, value) => sum + value * value, 0) / frameSamples;
  });
  const levels = logPower(power);
  const usual = median(levels.filter((_, frame) => isActive[frame] === 1));
  const lost = levels.filter((level, frame) => isActive[frame] !== 1 && level > usual - STILL_LOUD_NEPERS);
  return lost.length / Math.max(1, levels.length);
}
