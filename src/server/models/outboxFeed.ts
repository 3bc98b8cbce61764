import { QueryTypes } from 'sequelize';
import type { UpdateEvent } from '#lib/schemas/update.ts';
import { database } from '../database/connection.ts';

/** One event of the outbox, for the streams of all benches. */
export interface FeedEvent {
  readonly id: number;
  readonly benchId: string;
  readonly payload: UpdateEvent;
}

interface FeedRow {
  readonly id: string | number;
  readonly benchId: string;
  readonly payload: UpdateEvent | string;
}

/** The ids of the newest events, newest first. */
export async function listNewestIds(limit: number): Promise<number[]> {
  const rows = await database.query<{ id: string | number }>(
    '/* every bench: one feed serves the streams of all */ SELECT id FROM outbox ORDER BY id DESC LIMIT :limit',
    { type: QueryTypes.SELECT, replacements: { limit } },
  );
  return rows.map(({ id }) => Number(id));
}

/** Events above an id, oldest first. */
export async function listEventsAfter(afterId: number, limit: number): Promise<FeedEvent[]> {
  const rows = await database.query<FeedRow>(
    `/* every bench: one feed serves the streams of all */
     SELECT id, bench_id AS benchId, payload FROM outbox WHERE id > :afterId ORDER BY id LIMIT :limit`,
    { type: QueryTypes.SELECT, replacements: { afterId, limit } },
  );
  return rows.map(eventOf);
}

/** The same for some benches: what a stream missed while it was away. */
export async function listEventsOfBenches(
  benchIds: readonly string[],
  { afterId, limit }: { afterId: number; limit: number },
): Promise<FeedEvent[]> {
  if (benchIds.length === 0) return [];
  const rows = await database.query<FeedRow>(
    `SELECT id, bench_id AS benchId, payload FROM outbox
     WHERE bench_id IN (:benchIds) AND id > :afterId ORDER BY id LIMIT :limit`,
    { type: QueryTypes.SELECT, replacements: { benchIds: [...benchIds], afterId, limit } },
  );
  return rows.map(eventOf);
}

function eventOf({ id, benchId, payload }: FeedRow): FeedEvent {
  const event = typeof payload === 'string' ? (JSON.parse(payload) as UpdateEvent) : payload;
  return { id: Number(id), benchId, payload: event };
}
