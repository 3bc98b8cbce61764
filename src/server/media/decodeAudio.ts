/**
 * From an accepted file to samples. Plain WAV goes through wav-decoder, everything else through the
 * sandboxed ffmpeg; either result is judged by what came out, never by an exit status.
 *
 * Memory: of several channels at most two are kept, at most 115 million samples in all (461 MB), and
 * nothing else of the file is held; the largest accepted file stays below 1.5 GB of process memory.
 */
import { MAXIMUM_DURATION_SECONDS, MINIMUM_DURATION_SECONDS } from '#lib/schemas/uploadLimits.ts';
import { decodePlainWav, isPlainWav } from './decodePlainWav.ts';
import { decodeWithFfmpeg } from './decodeWithFfmpeg.ts';
import { CANNOT_DECODE_MESSAGE, MediaUnreadable, tooLongMessage, tooShortMessage } from './mediaErrors.ts';
import type { MediaProbe, MediaWarning, StreamProbe, WavProbe } from './mediaProbe.ts';
import { channelPolicyOf, SampleCollector, type ChannelPolicy } from './sampleCollector.ts';

export interface DecodedAudio {
  /**
   * Kept channels, shape [1 or 2][sampleCount], full scale ±1 (float recordings may exceed it). Values are
   * as decoded: NaN and infinities are found by the analysis. Each may be the start of a longer buffer.
   */
  readonly channels: Float32Array[];
  /** Rate of the recording itself, Hz: nothing is resampled. */
  readonly sampleRateHz: number;
  /** Length of what was decoded, seconds. */
  readonly durationSeconds: number;
  /** Length that the file declares, seconds; with `partial`, "5.1 of 10 s usable". Null when it declares none. */
  readonly declaredDurationSeconds: number | null;
  /** Which channels of the recording `channels` holds. */
  readonly channelPolicy: ChannelPolicy;
  /** Channels of the recording before any were left out. */
  readonly sourceChannelCount: number;
  readonly codec: string;
  readonly decoder: 'wav-decoder' | 'ffmpeg';
  readonly warnings: readonly MediaWarning[];
}

/** What encoders add at the ends, by which a whole recording may exceed the limit, seconds. */
const ENCODER_PADDING_SECONDS = 0.25;
/** Declared and decoded length of a whole recording differ by padding, and by the video that outlasts the sound, seconds. */
const DURATION_TOLERANCE_SECONDS = 0.5;

/**
 * Decodes the sound track that `probeMedia` chose.
 *
 * @param path the file that was probed
 * @param signal stops the work, for instance when the lease of the job is lost
 * @throws {MediaUnreadable} a final result: `truncated` for an MP4 whose recording was not finished, `too-long`,
 *   `too-short`, `unsupported-rate`, `cannot-decode`
 * @throws {DecoderCrashed} worth a second try
 */
export async function decodeAudio(path: string, probe: MediaProbe, signal?: AbortSignal): Promise<DecodedAudio> {
  if (probe.kind === 'unfinished') {
    throw new MediaUnreadable(
      'truncated',
      'The recording was not finished: the file ends before the index that every player needs. Record it again.',
    );
  }
  if (probe.kind === 'wav' && isPlainWav(probe.wav)) return decodeByWavDecoder(path, probe, signal);
  return decodeByFfmpeg(path, probe, signal);
}

async function decodeByWavDecoder(path: string, probe: WavProbe, signal?: AbortSignal): Promise<DecodedAudio> {
  const { collector, channelPolicy } = collectorFor(probe, probe);
  await decodePlainWav(path, probe.wav, collector, signal);
  return judge(probe, { ...probe, collector, channelPolicy, isClean: true, decoder: 'wav-decoder' });
}

async function decodeByFfmpeg(
  path: string,
  probe: WavProbe | StreamProbe,
  signal?: AbortSignal,
): Promise<DecodedAudio> {
  let found: (ReturnType<typeof collectorFor> & SoundFormat) | undefined;
  const sink = {
    start: (format: SoundFormat) => {
      found = { ...format, ...collectorFor(format, probe) };
    },
    add: (interleaved: Float32Array) => found?.collector.addInterleaved(interleaved),
  };
  const { isClean } = await decodeWithFfmpeg(path, probe, sink, signal);
  if (found === undefined) throw new MediaUnreadable('cannot-decode', CANNOT_DECODE_MESSAGE);
  return judge(probe, { ...found, isClean, decoder: 'ffmpeg' });
}

interface SoundFormat {
  readonly channelCount: number;
  readonly sampleRateHz: number;
}

function collectorFor({ channelCount, sampleRateHz }: SoundFormat, probe: WavProbe | StreamProbe) {
  const { channelPolicy, keptChannelCount } = channelPolicyOf(channelCount, sampleRateHz);
  const expectedSeconds = probe.declaredDurationSeconds;
  const collector = new SampleCollector({ channelCount, keptChannelCount, sampleRateHz, expectedSeconds });
  return { collector, channelPolicy };
}

interface Decoded extends SoundFormat {
  readonly collector: SampleCollector;
  readonly channelPolicy: ChannelPolicy;
  readonly isClean: boolean;
  readonly decoder: DecodedAudio['decoder'];
}

/** Decides by the samples whether this is a recording, the usable part of one, or nothing. */
function judge(probe: WavProbe | StreamProbe, decoded: Decoded): DecodedAudio {
  const offeredSeconds = decoded.collector.offeredFrames / decoded.sampleRateHz;
  if (offeredSeconds > MAXIMUM_DURATION_SECONDS + ENCODER_PADDING_SECONDS) {
    throw new MediaUnreadable('too-long', tooLongMessage(null));
  }
  if (offeredSeconds < MINIMUM_DURATION_SECONDS) {
    const isDamaged = !decoded.isClean || decoded.collector.offeredFrames === 0;
    throw isDamaged
      ? new MediaUnreadable('cannot-decode', CANNOT_DECODE_MESSAGE)
      : new MediaUnreadable('too-short', tooShortMessage(offeredSeconds));
  }
  const channels = decoded.collector.channels();
  return {
    channels,
    sampleRateHz: decoded.sampleRateHz,
    durationSeconds: (channels[0]?.length ?? 0) / decoded.sampleRateHz,
    declaredDurationSeconds: probe.declaredDurationSeconds,
    channelPolicy: decoded.channelPolicy,
    sourceChannelCount: decoded.channelCount,
    codec: probe.codec,
    decoder: decoded.decoder,
    warnings: warningsOf(probe, offeredSeconds, decoded.isClean),
  };
}

function warningsOf(probe: WavProbe | StreamProbe, decodedSeconds: number, isClean: boolean): MediaWarning[] {
  const isDeclared = probe.kind === 'wav' || !probe.isDurationEstimated;
  const declaredSeconds = (isDeclared ? probe.declaredDurationSeconds : null) ?? decodedSeconds;
  const missingSeconds = declaredSeconds - decodedSeconds;
  const warnings = new Set(probe.warnings);
  if (missingSeconds < -DURATION_TOLERANCE_SECONDS) warnings.add('header-mismatch');
  if (!isClean || missingSeconds > DURATION_TOLERANCE_SECONDS) warnings.add('partial');
  return [...warnings];
}
