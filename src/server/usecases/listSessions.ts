import { PAGE_DEFAULT_COUNT, type Page } from '#lib/schemas/page.ts';
import type { SessionPurpose } from '#lib/schemas/session.ts';
import { pageOfRows } from '../database/pageCursor.ts';
import { Session } from '../models/Session.ts';
import type { Actor } from '../policies/actor.ts';
import { benchesToReadIn } from './benchChoice.ts';
import { type SessionDetails, withSessionCounts } from './getSession.ts';

interface ListSessions {
  readonly actor: Actor;
  /** Left out: of all benches of the actor. */
  readonly benchId?: string | undefined;
  readonly purpose?: SessionPurpose | undefined;
  readonly limit?: number;
  readonly cursor?: string | undefined;
}

/** Newest first. @throws ServerError not-found for a foreign bench, invalid-fields for a cursor of another making. */
export async function listSessions(wanted: ListSessions): Promise<Page<SessionDetails>> {
  const { actor, benchId, purpose, limit = PAGE_DEFAULT_COUNT, cursor } = wanted;
  const rows = await Session.listByBenches(benchesToReadIn(actor, benchId), { limit: limit + 1, cursor, purpose });
  const { items, nextCursor } = pageOfRows(rows, limit);
  return { items: await withSessionCounts(items), nextCursor };
}
