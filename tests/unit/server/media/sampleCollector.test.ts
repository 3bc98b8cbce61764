import { describe, expect, it } from 'vitest';
import { channelPolicyOf, SampleCollector } from '#server/media/sampleCollector.ts';

const BYTES_PER_SAMPLE = 4;
/** Largest sum of samples that a decode may keep: 600 s of one channel at 192 kHz. */
const MAXIMUM_KEPT_BYTES = 600 * 192_000 * BYTES_PER_SAMPLE;

describe('channelPolicyOf', () => {
  it.each([
    [1, 48_000, 'all', 1],
    [2, 96_000, 'all', 2],
    [3, 44_100, 'first-two', 2],
    [8, 96_000, 'first-two', 2],
    [1, 192_000, 'all', 1],
    [2, 96_001, 'first', 1],
    [8, 192_000, 'first', 1],
  ])('%i channels at %i Hz: %s', (channelCount, sampleRateHz, channelPolicy, keptChannelCount) => {
    expect(channelPolicyOf(channelCount, sampleRateHz)).toEqual({ channelPolicy, keptChannelCount });
    expect(600 * sampleRateHz * keptChannelCount * BYTES_PER_SAMPLE).toBeLessThanOrEqual(MAXIMUM_KEPT_BYTES);
  });
});

describe('SampleCollector', () => {
  it('takes the first channels of interleaved frames, growing from a guess of 0 s', () => {
    const collector = new SampleCollector({
      channelCount: 3,
      keptChannelCount: 2,
      sampleRateHz: 10,
      expectedSeconds: 0,
    });
    for (let frame = 0; frame < 50; frame++) collector.addInterleaved(Float32Array.of(frame, frame + 0.5, 99));
    const [first, second] = collector.channels();
    expect(Array.from(first ?? [])).toEqual(Array.from({ length: 50 }, (_, frame) => frame));
    expect(Array.from(second ?? [])).toEqual(Array.from({ length: 50 }, (_, frame) => frame + 0.5));
  });

  it('takes planar frames behind interleaved ones', () => {
    const collector = new SampleCollector({
      channelCount: 1,
      keptChannelCount: 1,
      sampleRateHz: 10,
      expectedSeconds: null,
    });
    collector.addInterleaved(Float32Array.of(1, 2));
    collector.addPlanar([Float32Array.of(3, 4)]);
    expect(Array.from(collector.channels()[0] ?? [])).toEqual([1, 2, 3, 4]);
  });

  it('keeps 600 s and counts what is beyond', () => {
    const collector = new SampleCollector({
      channelCount: 1,
      keptChannelCount: 1,
      sampleRateHz: 10,
      expectedSeconds: 5,
    });
    for (let second = 0; second < 700; second++) collector.addInterleaved(new Float32Array(10).fill(second));
    expect(collector.offeredFrames).toBe(7000);
    expect(collector.channels()[0]?.length).toBe(6000);
    expect(collector.channels()[0]?.at(-1)).toBe(599);
  });
});
