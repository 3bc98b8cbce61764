/** What the decoder says of the samples that follow. */
export interface PipedWavFormat {
  readonly channelCount: number;
  readonly sampleRateHz: number;
}

const FIRST_CHUNK_OFFSET = 12;
const CHUNK_HEADER_BYTES = 8;
const BYTES_PER_SAMPLE = 4;

/**
 * Reads the 32-bit float WAV that ffmpeg writes to a pipe, cut into pieces anywhere. The header is what
 * tells the true rate and channels: the container's own claim can differ (HE-AAC doubles its rate).
 */
export class PipedWavParser {
  readonly #onFormat: (format: PipedWavFormat) => void;
  readonly #onSamples: (interleaved: Float32Array) => void;
  #pending: Buffer = Buffer.alloc(0);
  #frameBytes: number | null = null;

  constructor(handlers: {
    readonly onFormat: (format: PipedWavFormat) => void;
    /** Gets whole frames, shape [frameCount × channelCount], in a buffer of their own. */
    readonly onSamples: (interleaved: Float32Array) => void;
  }) {
    this.#onFormat = handlers.onFormat;
    this.#onSamples = handlers.onSamples;
  }

  /** Takes the next bytes of the pipe. */
  push(bytes: Buffer): void {
    this.#pending = this.#pending.length === 0 ? bytes : Buffer.concat([this.#pending, bytes]);
    this.#frameBytes ??= this.#readHeader();
    if (this.#frameBytes === null) return;
    const wholeBytes = this.#pending.length - (this.#pending.length % this.#frameBytes);
    if (wholeBytes === 0) return;
    // A copy, because a piece may start at any byte and a view of floats may not.
    const aligned = new Uint8Array(this.#pending.subarray(0, wholeBytes));
    this.#pending = this.#pending.subarray(wholeBytes);
    this.#onSamples(new Float32Array(aligned.buffer));
  }

  /** Finds format and start of the samples; null while bytes are missing. */
  #readHeader(): number | null {
    const bytes = this.#pending;
    let format: PipedWavFormat | null = null;
    for (let offset = FIRST_CHUNK_OFFSET; offset + CHUNK_HEADER_BYTES <= bytes.length;) {
      const id = bytes.toString('latin1', offset, offset + 4);
      const body = offset + CHUNK_HEADER_BYTES;
      if (id === 'data' && format !== null) {
        this.#pending = bytes.subarray(body);
        this.#onFormat(format);
        return format.channelCount * BYTES_PER_SAMPLE;
      }
      if (id === 'fmt ' && body + 8 <= bytes.length) {
        format = { channelCount: bytes.readUInt16LE(body + 2), sampleRateHz: bytes.readUInt32LE(body + 4) };
      }
      offset = body + bytes.readUInt32LE(offset + 4);
    }
    return null;
  }
}
