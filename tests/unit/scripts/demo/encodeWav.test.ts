import wavDecoder from 'wav-decoder';
import { describe, expect, it } from 'vitest';
import { encodeWav } from '#scripts/demo/encodeWav.ts';

const samples = Float32Array.of(0, 0.5, -0.5, 1, -1);
const decode = (file: Buffer) => wavDecoder.decode.sync(Uint8Array.from(file).buffer);

describe('encodeWav', () => {
  it('writes 16 bits that wav-decoder reads back within one step, at the rate', () => {
    const { sampleRate, numberOfChannels, channelData } = decode(encodeWav(samples, 44_100, 'int16'));
    expect({ sampleRate, numberOfChannels }).toEqual({ sampleRate: 44_100, numberOfChannels: 1 });
    const decoded = channelData[0] ?? new Float32Array();
    expect(decoded).toHaveLength(samples.length);
    decoded.forEach((value, index) => {
      expect(Math.abs(value - (samples[index] ?? 0))).toBeLessThan(1 / 32_767);
    });
  });

  it('writes floats that wav-decoder reads back exactly', () => {
    expect(decode(encodeWav(samples, 48_000, 'float32')).channelData[0]).toEqual(samples);
  });

  it('clips in 16 bits what lies beyond full scale', () => {
    const [decoded] = decode(encodeWav(Float32Array.of(2, -2), 48_000, 'int16')).channelData;
    expect(decoded?.[0]).toBeCloseTo(1, 3);
    expect(decoded?.[1]).toBeCloseTo(-1, 3);
  });
});
