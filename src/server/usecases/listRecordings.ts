import { PAGE_DEFAULT_COUNT, type Page } from '#lib/schemas/page.ts';
import { pageOfRows } from '../database/pageCursor.ts';
import { listRecordingsByBenches, type RecordingFilter } from '../models/recordingDetails.ts';
import type { Actor } from '../policies/actor.ts';
import { benchesToReadIn } from './benchChoice.ts';
import { type RecordingDetails, withDetails } from './recordingDetails.ts';

interface ListRecordings {
  readonly actor: Actor;
  /** Left out: of all benches of the actor. */
  readonly benchId?: string | undefined;
  readonly filter: RecordingFilter;
  readonly limit?: number;
  readonly cursor?: string | undefined;
}

/** Newest first. @throws ServerError not-found for a foreign bench, invalid-fields for a cursor of another making. */
export async function listRecordings(wanted: ListRecordings): Promise<Page<RecordingDetails>> {
  const { actor, benchId, filter, limit = PAGE_DEFAULT_COUNT, cursor } = wanted;
  const benchIds = benchesToReadIn(actor, benchId);
  const rows = await listRecordingsByBenches(benchIds, { filter, limit: limit + 1, cursor });
  const { items, nextCursor } = pageOfRows(rows, limit);
  return { items: await withDetails(items), nextCursor };
}
