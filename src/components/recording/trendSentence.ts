import { quantile } from '#lib/statistics/quantiles.ts';
import { numberText } from '#lib/format/numberText.ts';
import type { Motion } from '#lib/analysis/reading.ts';

/** The middle nine tenths of the speeds: what one moment did does not make a range. */
const LOW_PROBABILITY = 0.05;
const HIGH_PROBABILITY = 0.95;
const PER_CENT = 100;

/** How it ran, in one sentence, from the trend and the motion that the engine named. */
export function trendSentence(shaftSpeedRpm: readonly (number | null)[], motion: Motion): string {
  const speeds = shaftSpeedRpm.filter((value) => value !== null);
  if (speeds.length === 0) return 'At no moment could a turning shaft be followed.';
  const low = quantile(speeds, LOW_PROBABILITY);
  const high = quantile(speeds, HIGH_PROBABILITY);
  const heard = `${numberText((speeds.length / shaftSpeedRpm.length) * PER_CENT, 0)} % of the time`;
  const range = rangeWords(numberText(low, 0), numberText(high, 0));
  if (motion === 'steady') return `It ran ${range} all along, followed for ${heard}.`;
  if (motion === 'intermittent') return `It ran with pauses, ${range} while turning, heard turning for ${heard}.`;
  const first = speeds[0] ?? low;
  const last = speeds.at(-1) ?? high;
  return `It went from ${numberText(first, 0)} to ${numberText(last, 0)} rpm, ${range} nearly all of the time.`;
}

function rangeWords(low: string, high: string): string {
  return low === high ? `at ${low} rpm` : `between ${low} and ${high} rpm`;
}
