import { Worker } from 'bullmq';
import { settings } from '#server/env.ts';
import { logger } from '#server/logger.ts';
import { QUEUE_NAME } from '#server/queue/jobs.ts';
import { redisAddress } from '#server/queue/redisAddress.ts';

const RECONNECT_PAUSE_MILLISECONDS = 1000;
const CLOSE_LIMIT_MILLISECONDS = 1000;

/**
 * Calls `onRing` for every job that comes through Redis. The job itself is done with that: what waits, and whose
 * turn it is, stands in MariaDB. So a job that is doubled, lost or left over from another version does no harm.
 *
 * @returns stops listening, within about a second even when Redis does not answer
 */
export function listenForRings(onRing: () => void): () => Promise<void> {
  let isReachable = true;
  const listener = new Worker(
    QUEUE_NAME,
    () => {
      isReachable = true;
      onRing();
      return Promise.resolve();
    },
    {
      connection: {
        ...redisAddress(settings().redisUrl),
        maxRetriesPerRequest: null,
        retryStrategy: () => RECONNECT_PAUSE_MILLISECONDS,
      },
    },
  );
  listener.on('error', (error) => {
    // One log line an outage, not one an attempt to reconnect.
    if (isReachable) logger().warn({ err: error }, 'Redis is not reachable; looking into the database instead');
    isReachable = false;
  });
  listener.on('ready', () => {
    isReachable = true;
  });
  return async () => {
    const limit = new Promise((resolve) => setTimeout(resolve, CLOSE_LIMIT_MILLISECONDS).unref());
    // Closed while it is still connecting, BullMQ emits an error that nobody hears, and that ends the process.
    const closed = listener
      .waitUntilReady()
      .then(() => listener.close(true))
      .catch(() => undefined);
    await Promise.race([closed, limit]);
  };
}
