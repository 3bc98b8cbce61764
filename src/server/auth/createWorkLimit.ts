import { ServerError } from '../errors.ts';

const RETRY_AFTER_SECONDS = 5;

/**
 * Lets few pieces of costly work run at once and a bounded number wait their turn, in order.
 *
 * @returns a function that runs `work` when its turn comes. @throws ServerError too-many-requests when the queue is full.
 */
export function createWorkLimit(limits: { runningMaximum: number; waitingMaximum: number }) {
  const waiting: (() => void)[] = [];
  let runningCount = 0;

  async function takeTurn(): Promise<void> {
    if (runningCount < limits.runningMaximum) {
      runningCount += 1;
      return;
    }
    if (waiting.length >= limits.waitingMaximum) throw tooBusy();
    await new Promise<void>((resolve) => waiting.push(resolve));
  }

  /** Hands the turn over rather than giving it back, so that nobody overtakes the queue. */
  function endTurn(): void {
    const next = waiting.shift();
    if (next === undefined) runningCount -= 1;
    else next();
  }

  return async function run<Result>(work: () => Promise<Result>): Promise<Result> {
    await takeTurn();
    try {
      return await work();
    } finally {
      endTurn();
    }
  };
}

function tooBusy(): ServerError {
  return new ServerError({
    code: 'too-many-requests',
    detail: 'Very many people are signing in at this moment. Try again in a few seconds.',
    retryAfterSeconds: RETRY_AFTER_SECONDS,
  });
}
