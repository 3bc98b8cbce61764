import { SILENCE_RMS, levelWarnings, measureChannel } from './inputChecks.ts';
import type { ChannelLevel } from './inputChecks.ts';
import type { ReadingWarning } from './reading.ts';

/** The one signal that is analysed. */
export interface ChosenSignal {
  /** Mono, offset removed, full scale ±1, shape [sampleCount]. */
  readonly samples: Float32Array;
  /** Mean before it was removed. */
  readonly offset: number;
  /** Root mean square after the offset was removed. */
  readonly rms: number;
  readonly clippedFraction: number;
  readonly warnings: readonly ReadingWarning[];
}

/** A channel this much fainter than the loudest one (−50 dB) carries nothing. */
const DEAD_CHANNEL_RATIO = 3e-3;
/** A mix with less than this part of the mean power of its channels means that they cancel. */
const CANCELLING_POWER_FRACTION = 0.05;

/**
 * Mixes the channels, or takes the one that was asked for, or the loudest when a mix would cancel.
 *
 * @param channels at least one, all of shape [sampleCount] with at least one sample
 * @param choice `auto` or a channel number from 0; a channel that does not exist falls back to `auto`
 * @throws {AnalysisRefused} see `measureChannel`
 */
export function chooseChannel(channels: readonly Float32Array[], choice: 'auto' | number): ChosenSignal {
  const levels = channels.map((channel) => measureChannel(channel));
  const loudestRms = Math.max(...levels.map((level) => level.rms));
  const warnings = new Set<ReadingWarning>();
  const isAlive = levels.map((level) => level.rms > DEAD_CHANNEL_RATIO * loudestRms);
  if (isAlive.includes(false) && loudestRms > SILENCE_RMS) warnings.add('dead-channel');
  const chosen = choice === 'auto' ? undefined : channels[choice];
  const alive = chosen ? [chosen] : channels.filter((_, index) => isAlive[index]);
  let mix = mixed(alive.length > 0 ? alive : channels);
  const aliveLevels = chosen ? [] : levels.filter((_, index) => isAlive[index]);
  if (aliveLevels.length > 1 && cancels(mix, aliveLevels)) {
    warnings.add('opposite-channels');
    mix = mixed([channels[levels.findIndex((level) => level.rms === loudestRms)] ?? mix]);
  }
  const level = measureChannel(mix);
  const clippedFraction = Math.max(level.clippedFraction, ...levels.map((each) => each.clippedFraction));
  for (const warning of levelWarnings({ ...level, clippedFraction })) warnings.add(warning);
  for (let sample = 0; sample < mix.length; sample++) mix[sample] = (mix[sample] as number) - level.offset;
  return {
    samples: mix,
    offset: level.offset,
    rms: level.rms,
    clippedFraction,
    warnings: [...warnings],
  };
}

/** Mean of the channels, always a new array. */
function mixed(channels: readonly Float32Array[]): Float32Array {
  const mix = new Float32Array(channels[0]?.length ?? 0);
  for (const channel of channels) {
    for (let sample = 0; sample < mix.length; sample++)
      mix[sample] = (mix[sample] as number) + (channel[sample] as number) / channels.length;
  }
  return mix;
}

function cancels(mix: Float32Array, levels: readonly ChannelLevel[]): boolean {
  const meanPower = levels.reduce((sum, level) => sum + level.rms * level.rms, 0) / levels.length;
  return measureChannel(mix).rms ** 2 < CANCELLING_POWER_FRACTION * meanPower;
}
