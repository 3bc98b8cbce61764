import { setTimeout as pause } from 'node:timers/promises';
import { beforeAll, describe, expect, it, vi } from 'vitest';
import { repeat } from '#worker/repeat.ts';

beforeAll(() => {
  // The logger reads the settings; nothing connects.
  vi.stubEnv('RIPPLEBENCH_DATABASE_URL', 'mariadb://nobody@127.0.0.1:1/none');
  vi.stubEnv('RIPPLEBENCH_REDIS_URL', 'redis://127.0.0.1:1');
  vi.stubEnv('RIPPLEBENCH_LOG_LEVEL', 'silent');
});

describe('repeat', () => {
  it('goes on after a failure and ends when it is told', async () => {
    const stop = new AbortController();
    let runCount = 0;
    const task = (): Promise<void> => {
      runCount += 1;
      if (runCount === 4) stop.abort();
      return runCount === 2 ? Promise.reject(new Error('once')) : Promise.resolve();
    };
    await repeat({ name: 'test', everySeconds: 0.001, task, stopping: stop.signal });
    expect(runCount).toBe(4);
  });

  it('never runs the task twice at a time', async () => {
    const stop = new AbortController();
    let runningCount = 0;
    const peaks: number[] = [];
    const task = async (): Promise<void> => {
      runningCount += 1;
      peaks.push(runningCount);
      await pause(10);
      runningCount -= 1;
      if (peaks.length === 5) stop.abort();
    };
    await repeat({ name: 'test', everySeconds: 0.001, task, stopping: stop.signal });
    expect(peaks).toEqual([1, 1, 1, 1, 1]);
  });

  it('does not begin when it is told to stop before the first time', async () => {
    const stop = new AbortController();
    const ended = repeat({
      name: 'test',
      everySeconds: 3600,
      firstAfterSeconds: 3600,
      task: () => Promise.reject(new Error('must not run')),
      stopping: stop.signal,
    });
    stop.abort();
    await expect(ended).resolves.toBeUndefined();
  });
});
