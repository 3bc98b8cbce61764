import { z } from 'zod';
import { MAXIMUM_DURATION_SECONDS } from '#lib/schemas/uploadLimits.ts';
import { COMMON_ARGUMENTS, DECODER_WHITELIST } from './ffmpegArguments.ts';
import { runSandboxed } from './runSandboxed.ts';
import type { MediaContainer } from './sniffContainer.ts';

/** A number that ffprobe writes as text, or leaves out. */
const numberAsText = z.coerce.number().positive().optional().catch(undefined);

const ffprobeReport = z.object({
  streams: z
    .array(
      z.object({
        index: z.number(),
        codec_name: z.string().optional(),
        codec_type: z.string().optional(),
        sample_rate: numberAsText,
        channels: z.number().optional(),
        duration: numberAsText,
        disposition: z.object({ default: z.number(), attached_pic: z.number() }).optional(),
      }),
    )
    .default([]),
  format: z.object({ duration: numberAsText }).default({}),
  packets: z.array(z.object({ pts_time: numberAsText })).default([]),
});
export type FfprobeReport = z.infer<typeof ffprobeReport>;

/** The examination could not be finished in its time. */
export class ProbeTimedOut extends Error {
  override readonly name = 'ProbeTimedOut';
}

const REPORTED_ENTRIES = [
  'format=duration',
  'stream=index,codec_name,codec_type,sample_rate,channels,duration',
  'stream_disposition=default,attached_pic',
].join(':');
/** A report is a few hundred bytes a stream; more is an attack. */
const MAXIMUM_REPORT_BYTES = 262_144;
/** How far beyond the limit to look for sound: demuxers stop at the packet before the place asked for. */
const LOOK_BEYOND_SECONDS = 10;

/** Containers that may carry video. Their own tables say all about the sound, so nothing is decoded to find out. */
const TABLE_ONLY: ReadonlySet<MediaContainer> = new Set(['mp4', 'matroska']);
/** Cover pictures and video beside sound: ffprobe opens these decoders (and exits if it may not) but never runs them. */
const OPENED_NEVER_RUN = 'png,mjpeg,gif,bmp,tiff,webp,theora';

export interface ProbeScope {
  readonly path: string;
  readonly container: MediaContainer;
  readonly wallSeconds: number;
  readonly signal?: AbortSignal | undefined;
}

/**
 * Lists the streams of a file with the sandboxed ffprobe.
 *
 * @returns null when ffprobe cannot make sense of the file
 * @throws {ProbeTimedOut}
 */
export function readStreams(scope: ProbeScope): Promise<FfprobeReport | null> {
  return runFfprobe(scope, ['-show_entries', REPORTED_ENTRIES]);
}

/**
 * Whether sound lies beyond the longest allowed duration. The duration that a file declares may be a lie or
 * an estimate, in both directions; a packet there is a fact.
 *
 * @throws {ProbeTimedOut}
 */
export async function hasSoundBeyondLimit(scope: ProbeScope, streamIndex: number): Promise<boolean> {
  const report = await runFfprobe(scope, [
    ...['-select_streams', String(streamIndex)],
    ...['-read_intervals', `${MAXIMUM_DURATION_SECONDS + LOOK_BEYOND_SECONDS}%+#1`],
    ...['-show_entries', 'packet=pts_time'],
  ]);
  return report?.packets.some(({ pts_time }) => (pts_time ?? 0) > MAXIMUM_DURATION_SECONDS) ?? false;
}

async function runFfprobe(scope: ProbeScope, query: readonly string[]): Promise<FfprobeReport | null> {
  const pieces: Buffer[] = [];
  const decoding = TABLE_ONLY.has(scope.container)
    ? ['-nofind_stream_info']
    : ['-codec_whitelist', DECODER_WHITELIST, '-codec_whitelist:v', OPENED_NEVER_RUN];
  const run = await runSandboxed({
    program: 'ffprobe',
    programArguments: (input) => [...COMMON_ARGUMENTS, ...decoding, ...query, '-of', 'json', input],
    inputPath: scope.path,
    wallSeconds: scope.wallSeconds,
    maximumOutputBytes: MAXIMUM_REPORT_BYTES,
    onOutput: (bytes) => void pieces.push(bytes),
    signal: scope.signal,
  });
  if (run.ending === 'timed-out') throw new ProbeTimedOut('ffprobe did not finish in time');
  if (run.ending !== 'exited' || run.exitStatus !== 0) return null;
  return ffprobeReport.parse(JSON.parse(Buffer.concat(pieces).toString('utf8')));
}
