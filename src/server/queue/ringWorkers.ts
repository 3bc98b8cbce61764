import { Queue } from 'bullmq';
import { Redis } from 'ioredis';
import { settings } from '../env.ts';
import { logger } from '../logger.ts';
import { analyseRecordingJobId, JOBS, type JobPayload, QUEUE_NAME } from './jobs.ts';
import { redisAddress } from './redisAddress.ts';

/** How long an acknowledged upload may wait for its bell. Workers look into the database every 2 s anyway. */
const RING_BUDGET_MILLISECONDS = 300;
const CONNECT_TIMEOUT_MILLISECONDS = 1000;
const RECONNECT_PAUSE_MILLISECONDS = 500;

let bell: { readonly queue: Queue; readonly connection: Redis } | undefined;
let isReachable = true;

function openBell() {
  const connection = new Redis({
    ...redisAddress(settings().redisUrl),
    // Fail at once instead of collecting rings for a server that is away.
    enableOfflineQueue: false,
    maxRetriesPerRequest: 0,
    connectTimeout: CONNECT_TIMEOUT_MILLISECONDS,
    commandTimeout: RING_BUDGET_MILLISECONDS,
    retryStrategy: () => RECONNECT_PAUSE_MILLISECONDS,
  });
  const queue = new Queue(QUEUE_NAME, { connection });
  // Without a listener the first lost connection would end the process.
  queue.on('error', noteUnreachable);
  connection.on('error', noteUnreachable);
  return { queue, connection };
}

/** One log line an outage, not one an attempt. */
function noteUnreachable(error: unknown): void {
  if (!isReachable) return;
  isReachable = false;
  logger().warn({ err: error }, 'the bell is not reachable; workers find new recordings by looking into the database');
}

/**
 * Wakes a worker for a recording that is safely stored. Never throws and never takes longer than 300 ms: the
 * bell only makes things faster. With Redis stopped, `queue.add` alone could wait for ever.
 */
export async function ringWorkers(payload: JobPayload<'analyseRecording'>): Promise<void> {
  let timer: NodeJS.Timeout | undefined;
  try {
    bell ??= openBell();
    // During an outage that is already noted, waiting for the connection would only cost the caller time.
    if (!isReachable && bell.connection.status !== 'ready') return;
    const { options } = JOBS.analyseRecording;
    const ring = bell.queue.add('analyseRecording', payload, { ...options, jobId: analyseRecordingJobId(payload) });
    const budget = new Promise<never>((_, reject) => {
      timer = setTimeout(reject, RING_BUDGET_MILLISECONDS, new Error('The bell did not answer in time.'));
    });
    // The race keeps listening to the loser, so a late failure of the ring is not unhandled.
    await Promise.race([ring, budget]);
    isReachable = true;
  } catch (error) {
    noteUnreachable(error);
  } finally {
    clearTimeout(timer);
  }
}

/** Lets the process end. A later ring opens the connection anew. */
export function closeBell(): void {
  // Not the queue's own `close`: it waits for a connection that may never come.
  bell?.connection.disconnect();
  bell = undefined;
}
