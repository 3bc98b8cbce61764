import { MAXIMUM_CHANNELS, MAXIMUM_SAMPLE_RATE_HZ, MINIMUM_SAMPLE_RATE_HZ } from '#lib/schemas/uploadLimits.ts';
import { READABLE_CODECS } from './ffmpegArguments.ts';
import { MediaRefused, tooManyChannelsMessage, unsupportedRateMessage } from './mediaErrors.ts';
import type { StreamProbe } from './mediaProbe.ts';
import type { FfprobeReport } from './readStreams.ts';

export type SelectedStream = Pick<
  StreamProbe,
  | 'codec'
  | 'sampleRateHz'
  | 'channelCount'
  | 'declaredDurationSeconds'
  | 'hasVideo'
  | 'audioTrackCount'
  | 'audioStreamIndex'
>;

/**
 * Chooses the sound track that is measured: the one flagged as default, else the first.
 *
 * @throws {MediaRefused} `no-audio` without one; `cannot-decode` for a codec that is not read; `bad-header`,
 *   `too-many-channels` and `unsupported-rate` by what the container says of the track
 */
export function selectAudioStream(report: FfprobeReport): SelectedStream {
  const tracks = report.streams.filter((stream) => stream.codec_type === 'audio');
  const track = tracks.find((stream) => stream.disposition?.default === 1) ?? tracks[0];
  if (track === undefined) {
    throw new MediaRefused('no-audio', 'The file has no sound track. Record with sound and upload again.');
  }
  const { codec_name: codec = 'unknown', sample_rate: sampleRateHz, channels: channelCount } = track;
  if (!READABLE_CODECS.has(codec)) {
    throw new MediaRefused('cannot-decode', `Sound coded as ${printable(codec)} is not read. Save it as WAV or AAC.`);
  }
  if (sampleRateHz === undefined || channelCount === undefined || channelCount < 1) {
    throw new MediaRefused(
      'bad-header',
      'The header of this file is damaged: rate or channels are missing. Save it again.',
    );
  }
  if (channelCount > MAXIMUM_CHANNELS) {
    throw new MediaRefused('too-many-channels', tooManyChannelsMessage(channelCount));
  }
  if (sampleRateHz < MINIMUM_SAMPLE_RATE_HZ || sampleRateHz > MAXIMUM_SAMPLE_RATE_HZ) {
    throw new MediaRefused('unsupported-rate', unsupportedRateMessage(sampleRateHz));
  }
  return {
    codec,
    sampleRateHz,
    channelCount,
    declaredDurationSeconds: track.duration ?? report.format.duration ?? null,
    hasVideo: report.streams.some((stream) => stream.codec_type === 'video' && stream.disposition?.attached_pic !== 1),
    audioTrackCount: tracks.length,
    audioStreamIndex: track.index,
  };
}

/** ffprobe names codecs in lower case; anything else would come from the file. */
function printable(codec: string): string {
  return /^[a-z0-9_.-]{1,32}$/.test(codec) ? codec : 'an unknown kind';
}
