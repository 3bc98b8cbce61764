import { Op } from 'sequelize';
import { PAGE_DEFAULT_COUNT, type Page } from '#lib/schemas/page.ts';
import { afterCursor, NEWEST_FIRST, pageOfRows } from '../database/pageCursor.ts';
import { Build } from '../models/Build.ts';
import type { Actor } from '../policies/actor.ts';
import { benchesToReadIn } from './benchChoice.ts';
import { type BuildDetails, withRecordingCounts } from './getBuild.ts';

interface ListBuilds {
  readonly actor: Actor;
  /** Left out: of all benches of the actor. */
  readonly benchId?: string | undefined;
  readonly limit?: number;
  readonly cursor?: string | undefined;
}

/** Newest first. @throws ServerError not-found for a foreign bench, invalid-fields for a cursor of another making. */
export async function listBuilds(wanted: ListBuilds): Promise<Page<BuildDetails>> {
  const { actor, benchId, limit = PAGE_DEFAULT_COUNT, cursor } = wanted;
  const rows = await Build.findAll({
    where: { [Op.and]: [{ benchId: benchesToReadIn(actor, benchId) }, afterCursor(cursor)] },
    order: NEWEST_FIRST,
    limit: limit + 1,
  });
  const { items, nextCursor } = pageOfRows(rows, limit);
  return { items: await withRecordingCounts(items), nextCursor };
}
