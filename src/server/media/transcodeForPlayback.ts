import { open, rm } from 'node:fs/promises';
import { soundInputArguments } from './ffmpegArguments.ts';
import { CANNOT_DECODE_MESSAGE, DecoderCrashed, MediaUnreadable } from './mediaErrors.ts';
import type { MediaProbe } from './mediaProbe.ts';
import { runSandboxed, type SandboxedRun } from './runSandboxed.ts';

/** Media type of what `transcodeForPlayback` writes. */
export const PLAYBACK_MEDIA_TYPE = 'audio/mpeg';

const TRANSCODE_WALL_SECONDS = 60;
/** Ten minutes at the bit rate are under 10 MB. */
const MAXIMUM_OUTPUT_BYTES = 16_000_000;
/**
 * MP3 at a constant bit rate: every browser plays it, it needs no index (so that it can be written to a pipe
 * and sought in), and its length follows from its size.
 */
const MP3_ARGUMENTS = [
  ...['-c:a', 'libmp3lame', '-b:a', '128k', '-ar', '48000'],
  ...['-write_xing', '0', '-id3v2_version', '0', '-f', 'mp3', 'pipe:1'],
] as const;
/** Of more than two channels the first two are heard, as they are the ones that are measured. */
const FIRST_TWO_CHANNELS = ['-af', 'pan=stereo|c0=c0|c1=c1'] as const;

/**
 * Makes the sound that pages play: the original never reaches a browser's decoder, and nothing of its
 * metadata (place, device, pictures) is carried over.
 *
 * @param outputPath is written by us, not by the tool; removed again on failure
 * @throws {MediaUnreadable} `truncated`, `cannot-decode`
 * @throws {DecoderCrashed} worth a second try
 */
export async function transcodeForPlayback(
  path: string,
  probe: MediaProbe,
  outputPath: string,
  signal?: AbortSignal,
): Promise<{ bytes: number }> {
  if (probe.kind === 'unfinished') throw new MediaUnreadable('truncated', 'The recording was not finished.');
  const channelArguments = probe.channelCount > 2 ? FIRST_TWO_CHANNELS : [];
  const output = await open(outputPath, 'w');
  try {
    const run = await runSandboxed({
      program: 'ffmpeg',
      programArguments: (input) => [...soundInputArguments(probe, input), ...channelArguments, ...MP3_ARGUMENTS],
      inputPath: path,
      wallSeconds: TRANSCODE_WALL_SECONDS,
      maximumOutputBytes: MAXIMUM_OUTPUT_BYTES,
      onOutput: (bytes) => output.appendFile(bytes),
      signal,
    });
    const { size: bytes } = await output.stat();
    refuseWithoutSound(run, bytes);
    return { bytes };
  } catch (error) {
    await rm(outputPath, { force: true });
    throw error;
  } finally {
    await output.close();
  }
}

function refuseWithoutSound(run: SandboxedRun, bytes: number): void {
  if (run.ending === 'timed-out') throw new DecoderCrashed('timed-out');
  if (run.ending === 'killed') throw new DecoderCrashed('killed');
  if (bytes === 0) throw new MediaUnreadable('cannot-decode', CANNOT_DECODE_MESSAGE);
}
