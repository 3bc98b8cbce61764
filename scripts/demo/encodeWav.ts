const HEADER_BYTES = 44;
const FORMAT_CHUNK_BYTES = 16;
const BITS_PER_BYTE = 8;

const ENCODINGS = {
  int16: { formatTag: 1, bytesPerSample: 2 },
  float32: { formatTag: 3, bytesPerSample: 4 },
} as const;
export type WavEncoding = keyof typeof ENCODINGS;

const INT16_FULL_SCALE = 32_767;

/**
 * A mono WAV file.
 *
 * @param samples full scale ±1; what lies beyond is clipped in 16 bits and kept in floats
 */
export function encodeWav(samples: Float32Array, sampleRateHz: number, encoding: WavEncoding): Buffer {
  const { formatTag, bytesPerSample } = ENCODINGS[encoding];
  const soundBytes = samples.length * bytesPerSample;
  const file = Buffer.alloc(HEADER_BYTES + soundBytes);
  file.write('RIFF', 0, 'latin1');
  file.writeUInt32LE(HEADER_BYTES - 8 + soundBytes, 4);
  file.write('WAVEfmt ', 8, 'latin1');
  file.writeUInt32LE(FORMAT_CHUNK_BYTES, 16);
  file.writeUInt16LE(formatTag, 20);
  file.writeUInt16LE(1, 22);
  file.writeUInt32LE(sampleRateHz, 24);
  file.writeUInt32LE(sampleRateHz * bytesPerSample, 28);
  file.writeUInt16LE(bytesPerSample, 32);
  file.writeUInt16LE(bytesPerSample * BITS_PER_BYTE, 34);
  file.write('data', 36, 'latin1');
  file.writeUInt32LE(soundBytes, 40);
  samples.forEach((sample, index) => {
    const at = HEADER_BYTES + index * bytesPerSample;
    if (encoding === 'float32') file.writeFloatLE(sample, at);
    else file.writeInt16LE(Math.round(INT16_FULL_SCALE * Math.max(-1, Math.min(1, sample))), at);
  });
  return file;
}
