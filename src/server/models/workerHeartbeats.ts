import { QueryTypes } from 'sequelize';
import { database } from '../database/connection.ts';

/** Signs of life of the workers, in database time, so that clocks of other machines do not matter. */

/** A worker that has been silent this long is dead; its row only takes up room. */
const FORGOTTEN_AFTER_SECONDS = 86_400;

export async function beat({ workerId, threadCount }: { workerId: string; threadCount: number }): Promise<void> {
  await database.query(
    `INSERT INTO worker_heartbeats (id, thread_count) VALUES (:workerId, :threadCount)
     ON DUPLICATE KEY UPDATE seen_at = NOW(3)`,
    { type: QueryTypes.INSERT, replacements: { workerId, threadCount } },
  );
}

/** The last word of a worker that stops, and an occasion to forget those that died long ago. */
export async function sayGoodbye(workerId: string): Promise<void> {
  await database.query(
    'DELETE FROM worker_heartbeats WHERE id = :workerId OR seen_at < NOW(3) - INTERVAL :seconds SECOND',
    { type: QueryTypes.DELETE, replacements: { workerId, seconds: FORGOTTEN_AFTER_SECONDS } },
  );
}

/** How many workers gave a sign of life within the last `withinSeconds`; readiness wants at least one. */
export async function countLiveWorkers(withinSeconds: number): Promise<number> {
  const [row] = await database.query<{ liveCount: number }>(
    'SELECT COUNT(*) AS liveCount FROM worker_heartbeats WHERE seen_at >= NOW(3) - INTERVAL :withinSeconds SECOND',
    { type: QueryTypes.SELECT, replacements: { withinSeconds } },
  );
  return row?.liveCount ?? 0;
}
