import { describe, expect, it } from 'vitest';
import { averageSpectrum } from '#lib/signal/averageSpectrum.ts';
import { createRandom } from '#lib/signal/synthesis/random.ts';

const RATE_HZ = 8000;

function tones(frequenciesHz: readonly number[], seconds: number): Float32Array {
  return Float32Array.from({ length: RATE_HZ * seconds }, (_, n) =>
    frequenciesHz.reduce((sum, hertz) => sum + 0.4 * Math.sin((2 * Math.PI * hertz * n) / RATE_HZ), 0),
  );
}

/** Frequencies of the `count` highest local maxima, refined by a parabola through the logarithms. */
function highestPeaksHz(samples: Float32Array, count: number): number[] {
  const { power, binHz } = averageSpectrum(samples, RATE_HZ, 16_384);
  const log = (bin: number) => Math.log(power[bin] as number);
  const peaks: number[] = [];
  for (let bin = 1; bin < power.length - 1; bin++)
    if (log(bin) > log(bin - 1) && log(bin) > log(bin + 1)) peaks.push(bin);
  return peaks
    .sort((a, b) => log(b) - log(a))
    .slice(0, count)
    .map((bin) => {
      const [a, b, c] = [log(bin - 1), log(bin), log(bin + 1)];
      return (bin + (a - c) / (2 * (a - 2 * b + c))) * binHz;
    })
    .sort((a, b) => a - b);
}

describe('averageSpectrum', () => {
  it('gives a full-scale sine in the middle of a bin its power of 0.5', () => {
    const sine = Float32Array.from({ length: 4096 }, (_, n) => Math.sin((2 * Math.PI * 100 * n) / 1024));
    const { power } = averageSpectrum(sine, 1024, 1024);
    expect(power[100]).toBeCloseTo(0.5, 6);
  });

  it('spreads white noise of power 1 evenly: its bins add up to 1.5, the noise bandwidth of the window', () => {
    const random = createRandom(4);
    const noise = Float32Array.from({ length: 2 ** 17 }, () => random.normal());
    const { power } = averageSpectrum(noise, 1, 1024);
    // Relative scatter of a sum over 512 bins and 255 averages is below 1 %; 3 % is safe.
    expect(power.reduce((sum, value) => sum + value, 0)).toBeGreaterThan(1.5 * 0.97);
    expect(power.reduce((sum, value) => sum + value, 0)).toBeLessThan(1.5 * 1.03);
  });

  // ITU-T Q.23: key tones 697, 770, 852, 941 Hz with 1209, 1336, 1477, 1633 Hz.
  it.each([
    ['1', 697, 1209],
    ['5', 770, 1336],
    ['9', 852, 1477],
    ['D', 941, 1633],
  ])('finds both tones of key %s within 0.05 Hz', (_, lowHz, highHz) => {
    const [low, high] = highestPeaksHz(tones([lowHz, highHz], 4), 2);
    // A parabola on a Hann peak is off by at most 0.02 bins of 0.49 Hz.
    expect(Math.abs((low as number) - lowHz)).toBeLessThan(0.05);
    expect(Math.abs((high as number) - highHz)).toBeLessThan(0.05);
  });

  // ISO 16: a′ = 440 Hz; equal temperament f = 440 · 2^((m − 69)/12), middle c = 261.6256 Hz (OEIS A320304).
  it.each([
    [69, 440],
    [60, 261.6256],
  ])('finds note %d at %d Hz within 0.05 Hz', (note, hertz) => {
    const [peak] = highestPeaksHz(tones([440 * 2 ** ((note - 69) / 12)], 4), 1);
    expect(Math.abs((peak as number) - hertz)).toBeLessThan(0.05);
  });

  it('windows a signal shorter than the transform over its real length', () => {
    const [peak] = highestPeaksHz(tones([1000], 0.25), 1);
    expect(Math.abs((peak as number) - 1000)).toBeLessThan(0.5);
  });
});
