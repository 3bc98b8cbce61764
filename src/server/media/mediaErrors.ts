import {
  MAXIMUM_CHANNELS,
  MAXIMUM_DURATION_SECONDS,
  MAXIMUM_SAMPLE_RATE_HZ,
  MINIMUM_DURATION_SECONDS,
  MINIMUM_SAMPLE_RATE_HZ,
} from '#lib/schemas/uploadLimits.ts';

/** Why a file is refused before it is acknowledged. Permanent: clients and scripts compare them. */
export type MediaRefusalCode =
  | 'empty-file'
  | 'not-audio'
  | 'unsupported-media-type'
  | 'no-audio'
  | 'bad-header'
  | 'unsupported-rate'
  | 'too-many-channels'
  | 'too-short'
  | 'too-long'
  | 'cannot-decode'
  | 'probe-timed-out';

/** Why an acknowledged recording failed: what only decoding shows. Permanent like the refusals. */
export type MediaFailureCode = 'cannot-decode' | 'truncated' | 'too-short' | 'too-long' | 'unsupported-rate';

/**
 * A file that is not accepted. The message is for people: what happened, why, what to do; it never
 * holds a path or the output of a tool.
 */
export class MediaRefused extends Error {
  override readonly name = 'MediaRefused';
  readonly code: MediaRefusalCode;

  constructor(code: MediaRefusalCode, message: string) {
    super(message);
    this.code = code;
  }
}

/** An accepted file that gives no usable sound. An expected result of the job: stored, never tried again. */
export class MediaUnreadable extends Error {
  override readonly name = 'MediaUnreadable';
  readonly code: MediaFailureCode;

  constructor(code: MediaFailureCode, message: string) {
    super(message);
    this.code = code;
  }
}

/**
 * The decoder died or hung. The machine may be to blame as well as the file, so the job is tried once
 * more; after a second crash on the same file it fails with `cannot-decode`.
 */
export class DecoderCrashed extends Error {
  override readonly name = 'DecoderCrashed';
  readonly reason: 'timed-out' | 'killed';

  constructor(reason: 'timed-out' | 'killed') {
    super(reason === 'timed-out' ? 'The decoder took too long and was stopped.' : 'The decoder ended unexpectedly.');
    this.reason = reason;
  }
}

/** What the job stores after the second `DecoderCrashed` on one file. */
export const CANNOT_DECODE_MESSAGE =
  'The sound could not be decoded: the file is damaged. Save or record it again, as WAV if you can.';

/** "Too short: 0.2 s; at least 0.5 s needed. …" */
export function tooShortMessage(durationSeconds: number): string {
  const seconds = (Math.floor(durationSeconds * 10) / 10).toFixed(1);
  return `Too short: ${seconds} s; at least ${MINIMUM_DURATION_SECONDS} s needed. Record for longer and upload again.`;
}

/** "Too long: 4 h 0 min; limit 10 min. …"; null when the sound goes on past the limit and its length is not known. */
export function tooLongMessage(durationSeconds: number | null): string {
  const limitMinutes = MAXIMUM_DURATION_SECONDS / 60;
  const length = durationSeconds === null ? `more than ${limitMinutes} min` : spokenDuration(durationSeconds);
  return `Too long: ${length}; limit ${limitMinutes} min. Cut out the part to measure and upload that.`;
}

/** States the allowed range beside the rate that was found. */
export function unsupportedRateMessage(sampleRateHz: number): string {
  const range = `${MINIMUM_SAMPLE_RATE_HZ / 1000} to ${MAXIMUM_SAMPLE_RATE_HZ / 1000} kHz`;
  return `The sample rate is ${sampleRateHz} Hz; ${range} can be measured. Record or save it again at 48 kHz.`;
}

/** States the limit beside the number of channels that was found. */
export function tooManyChannelsMessage(channelCount: number): string {
  return `The sound has ${channelCount} channels; at most ${MAXIMUM_CHANNELS} are read. Save it as mono or stereo.`;
}

/** "10 min 1 s" or, from an hour on, "4 h 0 min"; rounded up to seconds, so that no excess reads as the limit itself. */
function spokenDuration(durationSeconds: number): string {
  const seconds = Math.ceil(durationSeconds);
  const minutes = Math.floor(seconds / 60);
  return minutes < 60 ? `${minutes} min ${seconds % 60} s` : `${Math.floor(minutes / 60)} h ${minutes % 60} min`;
}
