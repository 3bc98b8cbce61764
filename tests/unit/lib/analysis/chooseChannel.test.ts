import { describe, expect, it } from 'vitest';
import { chooseChannel } from '#lib/analysis/chooseChannel.ts';

const sine = Float32Array.from({ length: 1000 }, (_, n) => 0.5 * Math.sin(n / 7));
const other = Float32Array.from({ length: 1000 }, (_, n) => 0.5 * Math.sin(n / 3));

describe('chooseChannel', () => {
  it('mixes channels that live', () => {
    const { samples, warnings } = chooseChannel([sine, other], 'auto');
    expect(warnings).toEqual([]);
    const offset = chooseChannel([sine, other], 'auto').offset;
    expect(samples[100]).toBeCloseTo(((sine[100] ?? 0) + (other[100] ?? 0)) / 2 - offset, 6);
  });

  it('takes the louder of opposite channels and says so', () => {
    const { samples, warnings } = chooseChannel([sine.map((value) => -0.9 * value), sine], 'auto');
    expect(warnings).toEqual(['opposite-channels']);
    expect(samples[11]).toBeCloseTo(sine[11] ?? 0, 1);
  });

  it('leaves a channel out that is 60 dB fainter, and does not take it for half of the sound', () => {
    const { rms, warnings } = chooseChannel([sine, other.map((value) => value / 1000)], 'auto');
    expect(warnings).toEqual(['dead-channel']);
    expect(rms).toBeCloseTo(0.5 / Math.SQRT2, 2);
  });

  it('takes the channel that was asked for, without a word about cancelling', () => {
    const { samples, warnings } = chooseChannel([sine, sine.map((value) => -value)], 1);
    expect(warnings).toEqual([]);
    expect(samples[11]).toBeCloseTo(-(sine[11] ?? 0), 1);
  });

  it('removes and reports a constant', () => {
    const { offset, rms } = chooseChannel([new Float32Array(100).fill(0.3)], 'auto');
    expect(offset).toBeCloseTo(0.3, 6);
    expect(rms).toBeLessThan(1e-6);
  });

  it('does not write into its input', () => {
    const copy = sine.slice();
    chooseChannel([sine], 'auto');
    expect(sine).toEqual(copy);
  });
});
