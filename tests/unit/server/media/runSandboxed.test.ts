import { readFile } from 'node:fs/promises';
import { createServer, type AddressInfo } from 'node:net';
import { setTimeout as delay } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { runSandboxed, type SandboxedProgram, type SandboxedRun } from '#server/media/runSandboxed.ts';
import { detectSandboxMode, type SandboxMode } from '#server/media/sandboxMode.ts';
import { descendantsOf } from '#tests/fixtures/media/descendants.ts';
import { createMediaFolder, toneInput, type MediaFolder } from '#tests/fixtures/media/makeMedia.ts';

let folder: MediaFolder;
let tonePath: string;
beforeAll(async () => {
  folder = await createMediaFolder();
  tonePath = await folder.ffmpeg('tone.wav', ...toneInput(1));
});
afterAll(() => folder.remove());

/** Both where this machine allows namespaces; the other mode is all there is elsewhere. */
const MODES: readonly SandboxMode[] =
  (await detectSandboxMode()) === 'bubblewrap' ? ['bubblewrap', 'prlimit'] : ['prlimit'];
/** Silence without end, as fast as the pipe takes it. */
const FLOOD = ['-v', 'error', '-nostdin', '-f', 'lavfi', '-i', 'anullsrc', '-f', 'f32le', 'pipe:1'];
/** Silence without end, in real time and to nowhere: a hang. */
const hang = (marker: string) => ['-v', 'error', '-nostdin', '-re', '-f', 'lavfi', '-i', marker, '-f', 'null', '-'];

async function run(
  programArguments: readonly string[] | ((input: string) => readonly string[]),
  options: Partial<SandboxedProgram> = {},
): Promise<SandboxedRun & { output: Buffer }> {
  const pieces: Buffer[] = [];
  const result = await runSandboxed({
    program: 'ffmpeg',
    programArguments: typeof programArguments === 'function' ? programArguments : () => programArguments,
    inputPath: tonePath,
    wallSeconds: 20,
    maximumOutputBytes: 1_000_000,
    onOutput: (bytes) => void pieces.push(bytes),
    ...options,
  });
  return { ...result, output: Buffer.concat(pieces) };
}

/** A source of silence that no other process of this machine has in its command line. */
let markerCount = 0;
function uniqueSource(): string {
  return `anullsrc=n=${1000 + markerCount++}:d=${process.pid}`;
}

/** Waits until the marked tool runs, at most 5 s, and returns its process id. */
async function runningTool(marker: string): Promise<number> {
  for (let attempt = 0; attempt < 250; attempt++) {
    const tool = (await descendantsOf(marker)).find(({ name }) => name === 'ffmpeg');
    if (tool) return tool.pid;
    await delay(20);
  }
  throw new Error('ffmpeg did not start');
}

describe('detectSandboxMode', () => {
  it('names one of the two modes, the same each time', async () => {
    const mode = await detectSandboxMode();
    expect(MODES).toContain(mode);
    expect(await detectSandboxMode()).toBe(mode);
  });
});

describe.each(MODES)('runSandboxed by %s', (mode) => {
  it('passes the output on and reports exit status 0', async () => {
    const decode = (input: string) => ['-v', 'error', '-nostdin', '-i', input, '-f', 's16le', 'pipe:1'];
    const { ending, exitStatus, errorLines, output } = await run(decode, { mode });
    expect({ ending, exitStatus, errorLines }).toEqual({ ending: 'exited', exitStatus: 0, errorLines: [] });
    expect(output.length).toBe(2 * 48_000);
  });

  it('reports a failing program with its error lines as a result', async () => {
    const result = await run((input) => ['-v', 'error', '-nostdin', '-f', 'flac', '-i', input, '-f', 'null', '-'], {
      mode,
    });
    expect(result).toMatchObject({ ending: 'exited', exitStatus: 1 });
    expect(result.errorLines.length).toBeGreaterThan(0);
  });

  it('ends a program that never ends after its wall time, with its whole group', async () => {
    const source = uniqueSource();
    const startSeconds = performance.now() / 1000;
    expect(await run(hang(source), { mode, wallSeconds: 0.5 })).toMatchObject({ ending: 'timed-out' });
    expect(performance.now() / 1000 - startSeconds).toBeLessThan(5);
    expect(await descendantsOf(source)).toEqual([]);
  });

  it('ends a program that floods its output at exactly the allowed bytes', async () => {
    const result = await run(FLOOD, { mode, maximumOutputBytes: 1_000_001 });
    expect(result.ending).toBe('output-capped');
    expect(result.output.length).toBe(1_000_001);
  });

  it('keeps 16 kB of error lines of a program that floods them', async () => {
    const result = await run(['-v', 'trace', ...hang(uniqueSource()).slice(2)], { mode, wallSeconds: 1 });
    expect(result.errorLines.join('\n').length).toBeLessThanOrEqual(16_384);
    expect(result.errorLines.length).toBeGreaterThan(10);
  });

  it('waits for a slow reader instead of gathering the output', async () => {
    let running = 0;
    let most = 0;
    await run(FLOOD, {
      mode,
      onOutput: async () => {
        most = Math.max(most, ++running);
        await delay(1);
        running--;
      },
    });
    expect(most).toBe(1);
  });

  it.each(['SIGKILL', 'SIGSEGV'] as const)('reports a program that dies by %s as killed', async (signal) => {
    const source = uniqueSource();
    const result = run(hang(source), { mode });
    process.kill(await runningTool(source), signal);
    expect(await result).toMatchObject({ ending: 'killed' });
  });

  it('stops at once when it is told to, and throws the reason', async () => {
    const source = uniqueSource();
    const controller = new AbortController();
    const result = run(hang(source), { mode, signal: controller.signal });
    const rejection = expect(result).rejects.toThrow('lease lost');
    await runningTool(source);
    controller.abort(new Error('lease lost'));
    await rejection;
    expect(await descendantsOf(source)).toEqual([]);
  });

  it('throws what the receiver of the output throws, and leaves no process behind', async () => {
    const onOutput = (): void => {
      throw new Error('disk full');
    };
    const source = uniqueSource();
    const flood = FLOOD.map((argument) => (argument === 'anullsrc' ? source : argument));
    await expect(run(flood, { mode, onOutput })).rejects.toThrow('disk full');
    // The kill is sent before the rejection; the system takes a moment to carry it out.
    await vi.waitFor(async () => {
      expect(await descendantsOf(source)).toEqual([]);
    });
  });

  it('limits memory, processor time, open files, written files and core dumps of the tool', async () => {
    const source = uniqueSource();
    const controller = new AbortController();
    const result = run(hang(source), { mode, signal: controller.signal }).catch(() => null);
    const limits = await readFile(`/proc/${await runningTool(source)}/limits`, 'utf8');
    controller.abort();
    await result;
    const limitOf = (name: string): number => Number(new RegExp(`^${name}\\s+(\\d+)`, 'm').exec(limits)?.[1]);
    expect(limitOf('Max address space')).toBe(1024 ** 3);
    expect(limitOf('Max cpu time')).toBe(30);
    expect(limitOf('Max open files')).toBe(64);
    expect(limitOf('Max file size')).toBe(64 * 1024 ** 2);
    expect(limitOf('Max core file size')).toBe(0);
  });
});

describe.each(MODES.filter((mode) => mode === 'bubblewrap'))('runSandboxed by %s', (mode) => {
  it('shows the input under another name and no other file of the machine', async () => {
    const secret = await folder.ffmpeg('secret.wav', ...toneInput(1));
    const decode = (path: string) => ['-v', 'error', '-nostdin', '-i', path, '-f', 's16le', 'pipe:1'];
    expect((await run(() => decode(secret), { mode })).output.length).toBe(0);
    expect((await run((input) => decode(input), { mode })).output.length).toBe(96_000);
    expect((await run(() => decode(secret), { mode: 'prlimit' })).output.length).toBe(96_000);
  });

  it('cannot write over the input', async () => {
    const overwrite = (input: string) => ['-v', 'error', '-nostdin', '-y', ...toneInput(1), '-f', 'wav', input];
    const result = await run(overwrite, { mode });
    expect(result.exitStatus).toBe(1);
    expect(result.errorLines.join()).toContain('Read-only file system');
  });

  it('has no network, whatever protocols are allowed', async () => {
    let connectionCount = 0;
    const server = createServer((socket) => {
      connectionCount++;
      socket.destroy();
    });
    await new Promise<void>((listening) => server.listen(0, '127.0.0.1', listening));
    const address = `tcp://127.0.0.1:${(server.address() as AddressInfo).port}`;
    const fetch = ['-v', 'error', '-nostdin', '-f', 'f32le', '-i', address, '-f', 'null', '-'];
    try {
      await run(fetch, { mode: 'prlimit' });
      expect(connectionCount, 'control: without namespaces it connects').toBe(1);
      await run(fetch, { mode });
      expect(connectionCount).toBe(1);
    } finally {
      server.close();
    }
  });
});
