/**
 * The worker process. It claims recordings from MariaDB, analyses them in threads, and keeps the queue in order for
 * all workers. Redis only wakes it.
 */
import { randomUUID } from 'node:crypto';
import { once } from 'node:events';
import { setPriority } from 'node:os';
import { database } from '#server/database/connection.ts';
import { withDatabaseLock } from '#server/database/withDatabaseLock.ts';
import { settings } from '#server/env.ts';
import { logger } from '#server/logger.ts';
import { beat, sayGoodbye } from '#server/models/workerHeartbeats.ts';
import { closeBell } from '#server/queue/ringWorkers.ts';
import { requeueExpired } from '#server/usecases/requeueExpired.ts';
import { ringUndelivered } from '#server/usecases/ringUndelivered.ts';
import { sweepStorage } from '#server/usecases/sweepStorage.ts';
import { Bell } from './Bell.ts';
import { claimLoop } from './claimLoop.ts';
import { listenForRings } from './listenForRings.ts';
import { repeat } from './repeat.ts';

const THREAD_ENTRY = new URL('./threads/analyse.mjs', import.meta.url);
/** Pages come before analyses when the processor is busy. */
const NICENESS = 10;
const HEARTBEAT_SECONDS = 2;
const RECONCILE_SECONDS = 3;
const SWEEP_SECONDS = 3600;
const FIRST_SWEEP_SECONDS = 60;
/** Most analyses are done by then; a longer one goes back into the queue. */
const STOP_GRACE_SECONDS = 3;

async function reconcile(): Promise<void> {
  await requeueExpired();
  await ringUndelivered();
}

interface DutiesOptions {
  readonly workerId: string;
  readonly threadCount: number;
  readonly stopping: AbortSignal;
}

/** What a worker does beside analysing; the parts for all workers are done by one of them at a time. */
function startDuties({ workerId, threadCount, stopping }: DutiesOptions): Promise<void>[] {
  return [
    repeat({
      name: 'heartbeat',
      everySeconds: HEARTBEAT_SECONDS,
      stopping,
      task: () => beat({ workerId, threadCount }),
    }),
    repeat({
      name: 'reconcile',
      everySeconds: RECONCILE_SECONDS,
      stopping,
      task: () => withDatabaseLock('reconcile', reconcile),
    }),
    repeat({
      name: 'sweep',
      everySeconds: SWEEP_SECONDS,
      firstAfterSeconds: FIRST_SWEEP_SECONDS,
      stopping,
      task: () => withDatabaseLock('sweep', sweepStorage),
    }),
  ];
}

function askedToStop(): Promise<unknown> {
  return Promise.race([once(process, 'SIGTERM'), once(process, 'SIGINT')]);
}

async function main(): Promise<void> {
  setPriority(NICENESS);
  const { analysisThreadCount: threadCount, leaseSeconds } = settings();
  const workerId = randomUUID();
  const bell = new Bell();
  const stop = new AbortController();
  const giveUp = new AbortController();
  const stopListening = listenForRings(() => {
    bell.ring();
  });
  const slot = { bell, threadEntry: THREAD_ENTRY, leaseSeconds, stopping: stop.signal, giveUp: giveUp.signal };
  const slots = Array.from({ length: threadCount }, () => claimLoop(slot));
  const duties = startDuties({ workerId, threadCount, stopping: stop.signal });
  const stopRequest = askedToStop();
  logger().info({ workerId, threadCount, leaseSeconds }, 'the worker has started');

  // A slot ends by itself only when its thread cannot start: then this throws and the process ends.
  await Promise.race([stopRequest, ...slots]);
  logger().info({ workerId }, 'the worker is stopping');
  stop.abort();
  bell.ring();
  const graceTimer = setTimeout(() => {
    giveUp.abort();
  }, STOP_GRACE_SECONDS * 1000);
  await Promise.all([...slots, ...duties, stopListening()]);
  clearTimeout(graceTimer);
  await sayGoodbye(workerId).catch((error: unknown) => {
    logger().warn({ err: error }, 'the heartbeat row stays behind');
  });
  closeBell();
  await database.close();
  logger().info({ workerId }, 'the worker has stopped');
}

await main();
// BullMQ keeps timers and sockets for half a minute when it is closed while it is still connecting.
process.exit();
