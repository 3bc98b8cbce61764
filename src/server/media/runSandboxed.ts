import { spawn, type ChildProcess } from 'node:child_process';
import { resolve } from 'node:path';
import type { Readable } from 'node:stream';
import { bubblewrapArguments, detectSandboxMode, SANDBOXED_INPUT, type SandboxMode } from './sandboxMode.ts';

export interface SandboxedProgram {
  readonly program: 'ffmpeg' | 'ffprobe';
  /** Arguments of the program, given the name under which it sees the input. */
  readonly programArguments: (input: string) => readonly string[];
  readonly inputPath: string;
  /** Longest run, seconds of wall time. */
  readonly wallSeconds: number;
  /** Bytes of standard output after which the program is ended. */
  readonly maximumOutputBytes: number;
  /** Takes the standard output piece by piece; the next piece waits for the returned promise. */
  readonly onOutput: (bytes: Buffer) => void | Promise<void>;
  /** Ends the program early, for instance when the lease of the job is lost. */
  readonly signal?: AbortSignal | undefined;
  /** How to shut the program in; the detected mode unless given. */
  readonly mode?: SandboxMode | undefined;
}

/** How the program ended. */
export interface SandboxedRun {
  /** `killed`: by a signal that we did not send (a crash, the memory or the processor limit). */
  readonly ending: 'exited' | 'killed' | 'timed-out' | 'output-capped';
  /** Exit status; meaningful only when it exited by itself. */
  readonly exitStatus: number | null;
  /** What it wrote to standard error, for judging and for the log; never shown to a user. */
  readonly errorLines: readonly string[];
}

/** Limits of the process: memory, processor seconds, open files, size of written files, no core dump. */
const PRLIMIT_ARGUMENTS = [
  `--as=${1024 ** 3}`,
  '--cpu=30',
  '--nofile=64',
  `--fsize=${64 * 1024 ** 2}`,
  '--core=0',
  '--',
] as const;
const KEPT_ERROR_CHARACTERS = 16_384;
/** A wrapper reports the signal that ended its child as an exit status from here on. */
const SIGNAL_STATUS_BASE = 128;

/**
 * Runs a media tool on one untrusted file: no shell, no network, no other file (see `SandboxMode`), under
 * resource limits and a wall clock whose end kills the whole process group.
 *
 * @returns once the program and its streams have ended; a failing program is a result, not an exception
 * @throws what `onOutput` throws, the reason of `signal`, and the system's error when `prlimit` is missing
 */
export async function runSandboxed(options: SandboxedProgram): Promise<SandboxedRun> {
  const commandLine = await sandboxedCommandLine(options);
  options.signal?.throwIfAborted();
  const child = spawn('prlimit', commandLine, {
    stdio: ['ignore', 'pipe', 'pipe'],
    detached: true,
    env: { PATH: process.env.PATH },
  });
  const stopped: { reason?: 'timed-out' | 'output-capped' } = {};
  const stop = (reason: 'timed-out' | 'output-capped'): void => {
    stopped.reason ??= reason;
    killGroup(child);
  };
  const timer = setTimeout(stop, options.wallSeconds * 1000, 'timed-out');
  const abort = (): void => {
    killGroup(child);
  };
  options.signal?.addEventListener('abort', abort);
  try {
    const [end, errorText] = await Promise.all([
      endOf(child),
      readErrorText(child.stderr),
      forwardOutput(child.stdout, options, () => {
        stop('output-capped');
      }),
    ]);
    options.signal?.throwIfAborted();
    const ending = stopped.reason ?? (end.isBySignal ? 'killed' : 'exited');
    return { ending, exitStatus: end.exitStatus, errorLines: errorText.split('\n').filter((line) => line !== '') };
  } finally {
    clearTimeout(timer);
    options.signal?.removeEventListener('abort', abort);
    killGroup(child);
  }
}

async function sandboxedCommandLine(options: SandboxedProgram): Promise<string[]> {
  const inputPath = resolve(options.inputPath);
  const mode = options.mode ?? (await detectSandboxMode());
  if (mode === 'prlimit') {
    return [...PRLIMIT_ARGUMENTS, options.program, ...options.programArguments(`file:${inputPath}`)];
  }
  const wrapper = await bubblewrapArguments(inputPath);
  const inner = [options.program, ...options.programArguments(SANDBOXED_INPUT)];
  return [...PRLIMIT_ARGUMENTS, 'bwrap', ...wrapper, ...inner];
}

async function forwardOutput(stdout: Readable, options: SandboxedProgram, stop: () => void): Promise<void> {
  let leftBytes = options.maximumOutputBytes;
  for await (const chunk of stdout as AsyncIterable<Buffer>) {
    if (leftBytes <= 0) continue;
    await options.onOutput(chunk.length > leftBytes ? chunk.subarray(0, leftBytes) : chunk);
    leftBytes -= chunk.length;
    if (leftBytes < 0) stop();
  }
}

/** Keeps the first lines and drops the rest, but goes on reading so that the program never blocks on them. */
async function readErrorText(stderr: Readable): Promise<string> {
  let text = '';
  for await (const chunk of stderr as AsyncIterable<Buffer>) {
    if (text.length < KEPT_ERROR_CHARACTERS) text += chunk.toString('utf8');
  }
  return text.slice(0, KEPT_ERROR_CHARACTERS);
}

function endOf(child: ChildProcess): Promise<{ exitStatus: number | null; isBySignal: boolean }> {
  return new Promise((onEnd, onFailure) => {
    child.once('error', onFailure);
    child.once('close', (status, signal) => {
      onEnd({ exitStatus: status, isBySignal: signal !== null || (status ?? 0) >= SIGNAL_STATUS_BASE });
    });
  });
}

/** The child leads a process group of its own; the negative id means all of it. */
function killGroup(child: ChildProcess): void {
  if (child.pid === undefined || child.exitCode !== null || child.signalCode !== null) return;
  try {
    process.kill(-child.pid, 'SIGKILL');
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'ESRCH') throw error;
  }
}
