interface WavFileOptions {
  readonly durationSeconds?: number;
  /** Sound events a second; the fundamental of a sawtooth. Off every multiple of the mains, which would be hum. */
  readonly eventHz?: number;
  /** Makes files of equal sound differ in their bytes. */
  readonly seed?: number;
}

const SAMPLE_RATE_HZ = 16_000;
const BYTES_PER_SAMPLE = 2;
const HEADER_BYTES = 44;
const LEVEL = 0.3;

/**
 * A mono 16-bit PCM WAV of a sawtooth over a little seeded noise.
 * Reference: Microsoft and IBM (1991), Multimedia Programming Interface and Data Specifications 1.0, "Waveform Audio".
 */
export function wavFile({
  durationSeconds = 1,
  eventHz = 223,
  seed = 1,
}: WavFileOptions = {}): Uint8Array<ArrayBuffer> {
  const sampleCount = Math.round(durationSeconds * SAMPLE_RATE_HZ);
  const dataBytes = sampleCount * BYTES_PER_SAMPLE;
  const bytes = Buffer.from(new ArrayBuffer(HEADER_BYTES + dataBytes));
  bytes.write('RIFF', 0, 'latin1');
  bytes.writeUInt32LE(HEADER_BYTES - 8 + dataBytes, 4);
  bytes.write('WAVEfmt ', 8, 'latin1');
  bytes.writeUInt32LE(16, 16);
  bytes.writeUInt16LE(1, 20);
  bytes.writeUInt16LE(1, 22);
  bytes.writeUInt32LE(SAMPLE_RATE_HZ, 24);
  bytes.writeUInt32LE(SAMPLE_RATE_HZ * BYTES_PER_SAMPLE, 28);
  bytes.writeUInt16LE(BYTES_PER_SAMPLE, 32);
  bytes.writeUInt16LE(8 * BYTES_PER_SAMPLE, 34);
  bytes.write('data', 36, 'latin1');
  bytes.writeUInt32LE(dataBytes, 40);
  let state = seed >>> 0;
  for (let sample = 0; sample < sampleCount; sample += 1) {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    const phase = ((sample * eventHz) / SAMPLE_RATE_HZ) % 1;
    const value = LEVEL * (2 * phase - 1) + 0.02 * (state / 2 ** 31 - 1);
    bytes.writeInt16LE(Math.round(value * 32_767), HEADER_BYTES + sample * BYTES_PER_SAMPLE);
  }
  return new Uint8Array(bytes.buffer);
}
