import type { WavDescription } from './readWavHeader.ts';
import type { MediaContainer } from './sniffContainer.ts';

/** What a probe may warn of; `decodeAudio` may add `partial`. */
export type MediaWarning = 'header-mismatch' | 'partial';

interface ProbeFacts {
  readonly container: MediaContainer;
  /** Codec of the chosen sound track, in the spelling of the decoder, such as `aac` or `pcm_s16le`. */
  readonly codec: string | null;
  readonly sampleRateHz: number | null;
  readonly channelCount: number | null;
  /** Length before decoding, seconds; for WAV counted from the real bytes, otherwise what the file says. */
  readonly declaredDurationSeconds: number | null;
  /** Whether moving pictures come with the sound; a cover picture does not count. */
  readonly hasVideo: boolean;
  /** The default sound track is used, else the first. */
  readonly audioTrackCount: number;
  readonly warnings: readonly MediaWarning[];
}

/** A WAV, described by our own reader. */
export interface WavProbe extends ProbeFacts {
  readonly kind: 'wav';
  readonly container: 'wav';
  readonly codec: string;
  readonly sampleRateHz: number;
  readonly channelCount: number;
  readonly declaredDurationSeconds: number;
  readonly wav: WavDescription;
}

/** Any other container, described by ffprobe. */
export interface StreamProbe extends ProbeFacts {
  readonly kind: 'stream';
  readonly container: Exclude<MediaContainer, 'wav'>;
  readonly codec: string;
  readonly sampleRateHz: number;
  readonly channelCount: number;
  /** Index of the chosen sound track among all streams of the file. */
  readonly audioStreamIndex: number;
  /** Whether the declared duration is a guess from the bit rate. */
  readonly isDurationEstimated: boolean;
}

/** An MP4, 3GP or QuickTime file whose index was never written: nothing is known about its sound. */
export interface UnfinishedProbe extends ProbeFacts {
  readonly kind: 'unfinished';
  readonly container: 'mp4';
}

export type MediaProbe = WavProbe | StreamProbe | UnfinishedProbe;
