import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import { setTimeout as wait } from 'node:timers/promises';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { supervise } from '#scripts/setup/supervise.mjs';

const STAYS = 'setInterval(() => {}, 1000)';
/** The first pause is 0.5 s. */
const LONGER_THAN_PAUSE_MS = 900;

let starts: ChildProcess[] = [];
let said: string[] = [];

function sleeper(script = STAYS) {
  const start = () => {
    const child = spawn(process.execPath, ['-e', script], { stdio: 'ignore' });
    starts.push(child);
    return child;
  };
  return { name: 'sleeper', child: start(), start };
}

describe('supervise', () => {
  beforeEach(() => {
    starts = [];
    said = [];
    vi.spyOn(process.stderr, 'write').mockImplementation((text) => {
      said.push(String(text));
      return true;
    });
  });
  afterEach(() => {
    for (const child of starts) child.kill('SIGKILL');
    vi.restoreAllMocks();
  });

  it('starts a killed process again, says so, and hands on the new one', async () => {
    const running = sleeper();
    const leave = supervise(running);
    running.child.kill('SIGKILL');
    await vi.waitFor(
      () => {
        expect(starts).toHaveLength(2);
      },
      { timeout: 5000 },
    );
    await vi.waitFor(() => {
      expect(running.child).toBe(starts[1]);
    });
    expect(running.child.exitCode ?? running.child.signalCode).toBeNull();
    expect(said.join('')).toContain('sleeper ended (SIGKILL)');
    leave();
  });

  it('lets longer pauses pass while a process ends at once', async () => {
    const leave = supervise(sleeper('process.exit(3)'));
    await vi.waitFor(
      () => {
        expect(starts).toHaveLength(3);
      },
      { timeout: 10_000 },
    );
    leave();
    expect(said[0]).toContain('(status 3); starting it again in 0.5 s');
    expect(said[1]).toContain('(status 3); starting it again in 1 s');
  }, 15_000);

  it('leaves a process that is stopped on purpose, also during a pause', async () => {
    const running = sleeper();
    const other = sleeper('');
    const leaves = [supervise(running), supervise(other)];
    await once(other.child, 'exit');
    for (const leave of leaves) leave();
    running.child.kill('SIGTERM');
    await wait(LONGER_THAN_PAUSE_MS);
    expect(starts).toHaveLength(2);
  });
});
