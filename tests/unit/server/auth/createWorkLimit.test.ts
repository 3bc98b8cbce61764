import { describe, expect, it } from 'vitest';
import { createWorkLimit } from '#server/auth/createWorkLimit.ts';

/** Work that ends when it is told to. */
function manualWork() {
  let end: () => void = () => undefined;
  const done = new Promise<void>((resolve) => {
    end = resolve;
  });
  return { work: () => done, end };
}

const settled = () => new Promise((resolve) => setTimeout(resolve, 0));

describe('createWorkLimit', () => {
  it('runs two at once, and the third when one has ended', async () => {
    const limit = createWorkLimit({ runningMaximum: 2, waitingMaximum: 5 });
    const started: number[] = [];
    const jobs = [0, 1, 2].map(() => manualWork());
    const runs = jobs.map(({ work }, index) =>
      limit(() => {
        started.push(index);
        return work();
      }),
    );
    await settled();
    expect(started).toEqual([0, 1]);
    jobs[1]?.end();
    await settled();
    expect(started).toEqual([0, 1, 2]);
    for (const { end } of jobs) end();
    await Promise.all(runs);
  });

  it('refuses with 429 and a time when as many wait as may', async () => {
    const limit = createWorkLimit({ runningMaximum: 1, waitingMaximum: 1 });
    const { work, end } = manualWork();
    const runs = [limit(work), limit(work)];
    await expect(limit(work)).rejects.toMatchObject({ code: 'too-many-requests', retryAfterSeconds: 5 });
    end();
    await Promise.all(runs);
  });

  it('gives the turn on after work that failed', async () => {
    const limit = createWorkLimit({ runningMaximum: 1, waitingMaximum: 0 });
    await expect(limit(() => Promise.reject(new Error('broken')))).rejects.toThrow('broken');
    expect(await limit(() => Promise.resolve('fine'))).toBe('fine');
  });
});
