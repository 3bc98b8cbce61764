import { describe, expect, it } from 'vitest';
import { PipedWavParser, type PipedWavFormat } from '#server/media/pipedWavParser.ts';
import { chunkBytes, floatSamples, wavBytes } from '#tests/fixtures/media/wavBytes.ts';

const values = Array.from({ length: 20 }, (_, index) => index / 32);
const wav = wavBytes({
  data: floatSamples(values),
  formatTag: 3,
  bitsPerSample: 32,
  channelCount: 2,
  beforeData: chunkBytes('fact', Buffer.alloc(4)),
});

describe('PipedWavParser', () => {
  it.each([1, 7, 13, 1000])('gives the format once and all samples when pieces are %i bytes long', (pieceBytes) => {
    const formats: PipedWavFormat[] = [];
    const samples: number[] = [];
    const parser = new PipedWavParser({
      onFormat: (format) => formats.push(format),
      onSamples: (interleaved) => {
        expect(interleaved.length % 2).toBe(0);
        samples.push(...interleaved);
      },
    });
    for (let offset = 0; offset < wav.length; offset += pieceBytes)
      parser.push(wav.subarray(offset, offset + pieceBytes));
    expect(formats).toEqual([{ channelCount: 2, sampleRateHz: 44_100 }]);
    expect(samples).toEqual(values);
  });
});
