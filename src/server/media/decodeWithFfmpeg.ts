import {
  MAXIMUM_CHANNELS,
  MAXIMUM_DURATION_SECONDS,
  MAXIMUM_SAMPLE_RATE_HZ,
  MINIMUM_SAMPLE_RATE_HZ,
} from '#lib/schemas/uploadLimits.ts';
import { soundInputArguments } from './ffmpegArguments.ts';
import { CANNOT_DECODE_MESSAGE, DecoderCrashed, MediaUnreadable, unsupportedRateMessage } from './mediaErrors.ts';
import type { StreamProbe, WavProbe } from './mediaProbe.ts';
import { PipedWavParser, type PipedWavFormat } from './pipedWavParser.ts';
import { runSandboxed } from './runSandboxed.ts';

/** Receives what the decoder finds. */
export interface SampleSink {
  /** Called once, before any samples, with the format that the decoder really gives. */
  readonly start: (format: PipedWavFormat) => void;
  /** @param interleaved shape [frameCount × channelCount], full scale ±1, not checked for NaN */
  readonly add: (interleaved: Float32Array) => void;
}

const DECODE_WALL_SECONDS = 60;
/** The longest recording at the highest rate with all channels, and the second that is read beyond it. */
const MAXIMUM_OUTPUT_BYTES = (MAXIMUM_DURATION_SECONDS + 2) * MAXIMUM_SAMPLE_RATE_HZ * MAXIMUM_CHANNELS * 4;

/**
 * Decodes the chosen sound track with the sandboxed ffmpeg at its own rate and with its own channels.
 *
 * @returns whether the decoder had nothing to complain about; its exit status alone says too little
 * @throws {DecoderCrashed} when it was killed or ran out of time
 * @throws {MediaUnreadable} `unsupported-rate`, `cannot-decode` by what the decoder finds
 */
export async function decodeWithFfmpeg(
  path: string,
  probe: WavProbe | StreamProbe,
  sink: SampleSink,
  signal?: AbortSignal,
): Promise<{ isClean: boolean }> {
  const parser = new PipedWavParser({
    onFormat: (format) => {
      refuseImpossible(format);
      sink.start(format);
    },
    onSamples: sink.add,
  });
  const run = await runSandboxed({
    program: 'ffmpeg',
    programArguments: (input) => [
      ...soundInputArguments(probe, input),
      ...['-c:a', 'pcm_f32le', '-f', 'wav', 'pipe:1'],
    ],
    inputPath: path,
    wallSeconds: DECODE_WALL_SECONDS,
    maximumOutputBytes: MAXIMUM_OUTPUT_BYTES,
    onOutput: (bytes) => {
      parser.push(bytes);
    },
    signal,
  });
  if (run.ending === 'timed-out') throw new DecoderCrashed('timed-out');
  if (run.ending === 'killed') throw new DecoderCrashed('killed');
  return { isClean: run.ending === 'exited' && run.exitStatus === 0 && !run.errorLines.some(isComplaint) };
}

/** That the pictures beside the sound may not be decoded is our own wish. */
function isComplaint(errorLine: string): boolean {
  return !errorLine.includes('not on whitelist');
}

function refuseImpossible({ channelCount, sampleRateHz }: PipedWavFormat): void {
  if (sampleRateHz < MINIMUM_SAMPLE_RATE_HZ || sampleRateHz > MAXIMUM_SAMPLE_RATE_HZ) {
    throw new MediaUnreadable('unsupported-rate', unsupportedRateMessage(sampleRateHz));
  }
  if (channelCount < 1 || channelCount > MAXIMUM_CHANNELS) {
    throw new MediaUnreadable('cannot-decode', CANNOT_DECODE_MESSAGE);
  }
}
