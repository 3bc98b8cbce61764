import { describe, expect, it } from 'vitest';
import { Bell } from '#worker/Bell.ts';

/** Far beyond what any step here takes, and far below the time that a sleeper is allowed. */
const AT_ONCE_MILLISECONDS = 1000;
const LONG_SECONDS = 20;

async function millisecondsOf(sleep: Promise<void>): Promise<number> {
  const startedMilliseconds = performance.now();
  await sleep;
  return performance.now() - startedMilliseconds;
}

describe('Bell', () => {
  it('wakes every sleeper at once', async () => {
    const bell = new Bell();
    const sleepers = [1, 2, 3].map(() => millisecondsOf(bell.sleep(bell.ringCount, LONG_SECONDS)));
    bell.ring();
    for (const milliseconds of await Promise.all(sleepers)) expect(milliseconds).toBeLessThan(AT_ONCE_MILLISECONDS);
  });

  it('does not let anyone fall asleep after a ring that came since the look into the queue', async () => {
    const bell = new Bell();
    const heardCount = bell.ringCount;
    bell.ring();
    expect(await millisecondsOf(bell.sleep(heardCount, LONG_SECONDS))).toBeLessThan(AT_ONCE_MILLISECONDS);
  });

  it('lets a sleeper wake by itself after 0.05 s', async () => {
    const bell = new Bell();
    // Timers of Node may come a millisecond early.
    expect(await millisecondsOf(bell.sleep(bell.ringCount, 0.05))).toBeGreaterThanOrEqual(49);
  });
});
