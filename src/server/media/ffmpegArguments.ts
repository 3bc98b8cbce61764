import { MAXIMUM_DURATION_SECONDS } from '#lib/schemas/uploadLimits.ts';
import type { StreamProbe, WavProbe } from './mediaProbe.ts';

/**
 * What ffmpeg and ffprobe may do with an upload. Without the lists a playlist that is renamed to a sound
 * file makes them open other files and connect to other machines.
 */

/** Containers they may open. */
const FORMAT_WHITELIST = 'wav,w64,mp3,mov,matroska,ogg,flac,aac,amr,aiff,caf';

const PCM_DECODERS = [
  ...['pcm_u8', 'pcm_s8', 'pcm_alaw', 'pcm_mulaw'],
  ...['pcm_s16le', 'pcm_s24le', 'pcm_s32le', 'pcm_f32le', 'pcm_f64le'],
  ...['pcm_s16be', 'pcm_s24be', 'pcm_s32be', 'pcm_f32be', 'pcm_f64be'],
];
const COMPRESSED_DECODERS = [
  ...['aac', 'mp3', 'mp3float', 'mp2', 'mp2float', 'opus', 'libopus', 'vorbis', 'flac', 'alac'],
  ...['amrnb', 'amrwb', 'libopencore_amrnb', 'libopencore_amrwb'],
  ...['adpcm_ms', 'adpcm_ima_wav', 'adpcm_ima_qt', 'gsm_ms'],
];
/** Decoders they may use. No picture is ever decoded, not even to learn its size. */
export const DECODER_WHITELIST = [...PCM_DECODERS, ...COMPRESSED_DECODERS].join(',');

/** Codecs, in the spelling of ffprobe, that those decoders read. */
export const READABLE_CODECS: ReadonlySet<string> = new Set([
  ...PCM_DECODERS,
  ...['aac', 'mp3', 'mp2', 'opus', 'vorbis', 'flac', 'alac', 'amr_nb', 'amr_wb'],
  ...['adpcm_ms', 'adpcm_ima_wav', 'adpcm_ima_qt', 'gsm_ms'],
]);

/** Beyond the limit, so that a recording that is too long is seen and not just cut, seconds. */
const READ_BEYOND_LIMIT_SECONDS = 1;

/** Comes before everything else on every command line of ours. */
export const COMMON_ARGUMENTS = [
  ...['-v', 'repeat+error'],
  ...['-protocol_whitelist', 'file,pipe'],
  ...['-format_whitelist', FORMAT_WHITELIST],
] as const;

/** Opens the chosen sound track of the input and nothing else of it, as far as the longest allowed duration. */
export function soundInputArguments(probe: WavProbe | StreamProbe, input: string): string[] {
  const isSizeWrong = probe.kind === 'wav' && probe.wav.isSizeWrong;
  // ffmpeg 5.1 reads the header of RIFX rightly and then takes its samples for little-endian ones.
  const isBigEndian = probe.kind === 'wav' && probe.wav.form === 'RIFX';
  const streamIndex = probe.kind === 'wav' ? 0 : probe.audioStreamIndex;
  return [
    ...['-nostdin', '-threads', '1', ...COMMON_ARGUMENTS],
    ...['-codec_whitelist', DECODER_WHITELIST],
    ...['-t', String(MAXIMUM_DURATION_SECONDS + READ_BEYOND_LIMIT_SECONDS)],
    ...(isSizeWrong ? ['-ignore_length', '1'] : []),
    ...(isBigEndian ? ['-c:a', probe.codec] : []),
    ...['-i', input, '-map', `0:${streamIndex}`, '-vn', '-sn', '-dn'],
    ...['-map_metadata', '-1', '-map_chapters', '-1', '-bitexact'],
  ];
}
