import { createSecondsAt } from './eventTrack.ts';
import type { EventPhase } from './eventTrack.ts';
import type { SampledSignal } from './frontEnd.ts';

/**
 * A signal at equal steps of angle instead of time, so that a varying speed becomes constant.
 *
 * @param options first phase, step and number of samples, in event cycles; outside the recording the result is 0
 * @returns Float32Array, shape [sampleCount]
 * Reference: computed order tracking, K. Fyfe & E. Munck (1997), Analysis of computed order tracking, MSSP 11(2);
 * cubic interpolation through four samples (Catmull & Rom 1974).
 */
export function resampleByPhase(
  { samples, sampleRateHz }: SampledSignal,
  phase: EventPhase,
  options: {
    readonly firstCycle: number;
    readonly cyclesPerSample: number;
    readonly sampleCount: number;
  },
): Float32Array {
  const output = new Float32Array(options.sampleCount);
  const secondsAt = createSecondsAt(phase);
  const end = samples.length - 2;
  for (let index = 0; index < output.length; index++) {
    const position = secondsAt(options.firstCycle + index * options.cyclesPerSample) * sampleRateHz;
    const left = Math.floor(position);
    if (left < 1 || left >= end) continue;
    const part = position - left;
    const before = samples[left - 1] as number;
    const here = samples[left] as number;
    const next = samples[left + 1] as number;
    const after = samples[left + 2] as number;
    const curve = 2 * before - 5 * here + 4 * next - after + part * (3 * (here - next) + after - before);
    output[index] = here + (part / 2) * (next - before + part * curve);
  }
  return output;
}
