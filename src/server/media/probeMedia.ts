/**
 * What a file is, found out before it is acknowledged and without decoding it. WAV headers are read by our
 * own reader; everything else is recognised by its first bytes and described by the sandboxed ffprobe.
 */
import { open, type FileHandle } from 'node:fs/promises';
import { availableParallelism } from 'node:os';
import { MAXIMUM_DURATION_SECONDS, MINIMUM_DURATION_SECONDS } from '#lib/schemas/uploadLimits.ts';
import { clock } from '#server/clock.ts';
import { createGate } from './createGate.ts';
import { isEstimatedDuration } from './isEstimatedDuration.ts';
import { isUnfinishedMp4 } from './isUnfinishedMp4.ts';
import { MediaRefused, tooLongMessage, tooShortMessage } from './mediaErrors.ts';
import type { MediaProbe, StreamProbe, UnfinishedProbe, WavProbe } from './mediaProbe.ts';
import { hasSoundBeyondLimit, ProbeTimedOut, readStreams, type ProbeScope } from './readStreams.ts';
import { readWavHeader, type WavDescription } from './readWavHeader.ts';
import { selectAudioStream } from './selectAudioStream.ts';
import { isZipArchive, sniffContainer, type MediaContainer } from './sniffContainer.ts';

export interface ProbeOptions {
  /** Longest examination by ffprobe, seconds of wall time, not counting the wait for a free place. */
  readonly wallSeconds?: number;
  readonly signal?: AbortSignal;
}

/** An upload waits for this answer, so it is short. */
const PROBE_WALL_SECONDS = 2;
const probeGate = createGate(availableParallelism());

/**
 * Examines a file that may be anything.
 *
 * @param path of a complete file that nobody writes to
 * @returns what the sound is and how to decode it; an MP4 whose index was never written is accepted too
 *   (`kind: 'unfinished'`), because the upload is kept and only its decoding fails
 * @throws {MediaRefused} with the code and message for the uploader
 */
export async function probeMedia(path: string, options: ProbeOptions = {}): Promise<MediaProbe> {
  const file = await open(path, 'r');
  try {
    const { size: fileBytes } = await file.stat();
    if (fileBytes === 0) throw new MediaRefused('empty-file', 'The file is empty (0 bytes). Record or copy it again.');
    const container = await sniffContainer(file);
    if (container === null) throw (await isZipArchive(file)) ? archive() : notAudio();
    if (container === 'wav') return await probeWav(file, fileBytes);
    if (container === 'mp4' && (await isUnfinishedMp4(file, fileBytes))) return UNFINISHED_PROBE;
    return await probeGate(() => probeStreams(file, path, container, options));
  } finally {
    await file.close();
  }
}

async function probeWav(file: FileHandle, fileBytes: number): Promise<WavProbe> {
  const wav = await readWavHeader(file, fileBytes);
  if (wav === null) throw notAudio();
  refuseByDuration(wav.durationSeconds);
  return describeWav(wav);
}

function describeWav(wav: WavDescription): WavProbe {
  return {
    kind: 'wav',
    container: 'wav',
    codec: wav.format.codec,
    sampleRateHz: wav.format.sampleRateHz,
    channelCount: wav.format.channelCount,
    declaredDurationSeconds: wav.durationSeconds,
    hasVideo: false,
    audioTrackCount: 1,
    warnings: wav.isSizeWrong ? ['header-mismatch'] : [],
    wav,
  };
}

const UNFINISHED_PROBE: UnfinishedProbe = {
  kind: 'unfinished',
  container: 'mp4',
  codec: null,
  sampleRateHz: null,
  channelCount: null,
  declaredDurationSeconds: null,
  hasVideo: false,
  audioTrackCount: 0,
  warnings: [],
};

async function probeStreams(
  file: FileHandle,
  path: string,
  container: Exclude<MediaContainer, 'wav'>,
  { wallSeconds = PROBE_WALL_SECONDS, signal }: ProbeOptions,
): Promise<StreamProbe> {
  const deadlineSeconds = clock.monotonicSeconds() + wallSeconds;
  const scope = (): ProbeScope => ({
    path,
    container,
    wallSeconds: Math.max(0, deadlineSeconds - clock.monotonicSeconds()),
    signal,
  });
  const report = await readStreams(scope()).catch(refuseTimedOut);
  if (report === null) {
    throw new MediaRefused(
      'cannot-decode',
      'The file looks like a recording but its header is damaged. Save it again.',
    );
  }
  const stream = selectAudioStream(report);
  const isDurationEstimated = await isEstimatedDuration(file, container);
  const declaredDurationSeconds = stream.declaredDurationSeconds;
  if (declaredDurationSeconds !== null && !isDurationEstimated) refuseTooShort(declaredDurationSeconds);

  const mayBeTooLong = declaredDurationSeconds === null || declaredDurationSeconds > MAXIMUM_DURATION_SECONDS;
  if (mayBeTooLong && (await isSeenTooLong(scope(), stream.audioStreamIndex))) {
    throw new MediaRefused('too-long', tooLongMessage(declaredDurationSeconds));
  }
  const isDeclarationFalse = declaredDurationSeconds !== null && mayBeTooLong;
  return {
    kind: 'stream',
    container,
    ...stream,
    declaredDurationSeconds: isDeclarationFalse ? null : declaredDurationSeconds,
    isDurationEstimated,
    warnings: isDeclarationFalse && !isDurationEstimated ? ['header-mismatch'] : [],
  };
}

/** Without an answer in time the upload is accepted: the decoder stops at the limit as well. */
async function isSeenTooLong(scope: ProbeScope, streamIndex: number): Promise<boolean> {
  try {
    return await hasSoundBeyondLimit(scope, streamIndex);
  } catch (error) {
    if (error instanceof ProbeTimedOut) return false;
    throw error;
  }
}

function refuseTimedOut(error: unknown): never {
  if (!(error instanceof ProbeTimedOut)) throw error;
  throw new MediaRefused('probe-timed-out', 'The file could not be examined in time. Try again in a minute.');
}

function refuseByDuration(durationSeconds: number): void {
  refuseTooShort(durationSeconds);
  if (durationSeconds > MAXIMUM_DURATION_SECONDS) throw new MediaRefused('too-long', tooLongMessage(durationSeconds));
}

function refuseTooShort(durationSeconds: number): void {
  if (durationSeconds < MINIMUM_DURATION_SECONDS) {
    throw new MediaRefused('too-short', tooShortMessage(durationSeconds));
  }
}

function notAudio(): MediaRefused {
  return new MediaRefused(
    'not-audio',
    'The file is not a sound or video recording that can be read. Upload the original.',
  );
}

function archive(): MediaRefused {
  return new MediaRefused(
    'unsupported-media-type',
    'The file is a ZIP archive, which is not unpacked here. Unpack it and upload the recordings in it.',
  );
}
