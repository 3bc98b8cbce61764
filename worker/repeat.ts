import { setTimeout as pause } from 'node:timers/promises';
import { logger } from '#server/logger.ts';

interface Duty {
  /** For the log. */
  readonly name: string;
  readonly everySeconds: number;
  readonly firstAfterSeconds?: number;
  readonly task: () => Promise<unknown>;
  readonly stopping: AbortSignal;
}

/** Runs a task again and again, never twice at a time. A failure is logged, once in a row, and does not end it. */
export async function repeat({ name, everySeconds, firstAfterSeconds = 0, task, stopping }: Duty): Promise<void> {
  let isFailing = false;
  let pauseSeconds = firstAfterSeconds;
  while (await hasPaused(pauseSeconds, stopping)) {
    try {
      await task();
      isFailing = false;
    } catch (error) {
      if (!isFailing) logger().error({ err: error, duty: name }, 'a regular duty failed');
      isFailing = true;
    }
    pauseSeconds = everySeconds;
  }
}

/** @returns false when it was time to stop */
async function hasPaused(seconds: number, stopping: AbortSignal): Promise<boolean> {
  await pause(seconds * 1000, undefined, { signal: stopping }).catch(() => undefined);
  return !stopping.aborted;
}
