import type { Series } from '../series.ts';

/** Most points of a waveform overview: more than any screen is wide. */
const MOST_POINTS = 4096;

/**
 * Overview of the waveform: the lowest and highest sample of each stretch, so that no peak is lost.
 *
 * @param samples shape [sampleCount], full scale ±1
 * @param startSeconds time of the first sample in the recording
 */
export function waveformSeries(samples: Float32Array, sampleRateHz: number, startSeconds: number): Series {
  const count = Math.min(MOST_POINTS, samples.length);
  const timeSeconds = new Float32Array(count);
  const minimum = new Float32Array(count);
  const maximum = new Float32Array(count);
  for (let point = 0; point < count; point++) {
    const start = Math.floor((point * samples.length) / count);
    const end = Math.floor(((point + 1) * samples.length) / count);
    let low = Infinity;
    let high = -Infinity;
    for (let sample = start; sample < end; sample++) {
      const value = samples[sample] as number;
      if (value < low) low = value;
      if (value > high) high = value;
    }
    timeSeconds[point] = startSeconds + (start + end) / 2 / sampleRateHz;
    minimum[point] = low;
    maximum[point] = high;
  }
  return {
    name: 'waveform',
    columns: [
      { name: 'timeSeconds', unit: 's', values: timeSeconds },
      { name: 'minimum', unit: '1', values: minimum },
      { name: 'maximum', unit: '1', values: maximum },
    ],
  };
}
