import { MAXIMUM_DURATION_SECONDS } from '#lib/schemas/uploadLimits.ts';

/**
 * Which channels of a recording are kept. Channels are never mixed here: two microphones of one device can
 * cancel each other. `first-two` of three to eight; `first` alone above 96 kHz, where two channels of ten
 * minutes would not fit into the memory of the worker.
 */
export type ChannelPolicy = 'all' | 'first-two' | 'first';

/** Above this rate one channel is kept, Hz: 600 s × 2 × 96 kHz and 600 s × 192 kHz are the same 461 MB of samples. */
const HIGHEST_TWO_CHANNEL_RATE_HZ = 96_000;

/** Which of the channels are kept at a rate, and how many that makes. */
export function channelPolicyOf(
  channelCount: number,
  sampleRateHz: number,
): { channelPolicy: ChannelPolicy; keptChannelCount: number } {
  if (channelCount === 1) return { channelPolicy: 'all', keptChannelCount: 1 };
  if (sampleRateHz > HIGHEST_TWO_CHANNEL_RATE_HZ) return { channelPolicy: 'first', keptChannelCount: 1 };
  return { channelPolicy: channelCount === 2 ? 'all' : 'first-two', keptChannelCount: 2 };
}

export interface CollectorOptions {
  readonly channelCount: number;
  readonly keptChannelCount: number;
  readonly sampleRateHz: number;
  /** Best guess of the length, seconds; a wrong one costs a copy and nothing else. */
  readonly expectedSeconds: number | null;
}

/** Room for what codecs add at the ends, so that the usual case never grows, seconds. */
const SPARE_SECONDS = 1;
/** Guess without a declaration, seconds. */
const USUAL_SECONDS = 30;
const GROWTH_FACTOR = 1.5;

/**
 * Gathers decoded frames, keeping the first channels up to the longest allowed duration. Memory stays below
 * 1.7 times the most that may be kept: where the guess of the length was wrong, one channel at a time is
 * copied to a buffer one and a half times as long.
 */
export class SampleCollector {
  readonly #options: CollectorOptions;
  readonly #maximumFrames: number;
  #channels: Float32Array[];
  #offeredFrames = 0;
  #keptFrames = 0;

  constructor(options: CollectorOptions) {
    this.#options = options;
    this.#maximumFrames = Math.ceil(MAXIMUM_DURATION_SECONDS * options.sampleRateHz);
    const expectedSeconds = (options.expectedSeconds ?? USUAL_SECONDS) + SPARE_SECONDS;
    const capacity = Math.min(this.#maximumFrames, Math.ceil(expectedSeconds * options.sampleRateHz));
    this.#channels = Array.from({ length: options.keptChannelCount }, () => new Float32Array(capacity));
  }

  /** Frames given so far, including those beyond the limit that were not kept. */
  get offeredFrames(): number {
    return this.#offeredFrames;
  }

  /** Adds whole frames. @param samples shape [frameCount × channelCount], channels interleaved */
  addInterleaved(samples: Float32Array): void {
    const { channelCount } = this.#options;
    const frameCount = this.#makeRoom(samples.length / channelCount);
    this.#channels.forEach((channel, index) => {
      for (let frame = 0; frame < frameCount; frame++) {
        channel[this.#keptFrames + frame] = samples[frame * channelCount + index] ?? 0;
      }
    });
    this.#keptFrames += frameCount;
  }

  /** Adds frames. @param channels shape [≥ keptChannelCount][frameCount] */
  addPlanar(channels: readonly Float32Array[]): void {
    const frameCount = this.#makeRoom(channels[0]?.length ?? 0);
    this.#channels.forEach((channel, index) => {
      channel.set(channels[index]?.subarray(0, frameCount) ?? [], this.#keptFrames);
    });
    this.#keptFrames += frameCount;
  }

  /** The kept channels, shape [keptChannelCount][frameCount]; each may be the start of a longer buffer. */
  channels(): Float32Array[] {
    return this.#channels.map((channel) => channel.subarray(0, this.#keptFrames));
  }

  /** @returns how many of the offered frames will be kept */
  #makeRoom(frameCount: number): number {
    this.#offeredFrames += frameCount;
    const keptAfter = Math.min(this.#maximumFrames, this.#keptFrames + frameCount);
    const capacity = this.#channels[0]?.length ?? 0;
    if (keptAfter > capacity) this.#grow(Math.min(this.#maximumFrames, Math.ceil(keptAfter * GROWTH_FACTOR)));
    return keptAfter - this.#keptFrames;
  }

  #grow(capacity: number): void {
    for (const [index, channel] of this.#channels.entries()) {
      const larger = new Float32Array(capacity);
      larger.set(channel);
      this.#channels[index] = larger;
    }
  }
}
