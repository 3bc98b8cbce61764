import { QueryTypes } from 'sequelize';
import { UNSURE_BELOW_CONFIDENCE } from '#lib/analysis/reading.ts';
import { database } from '../database/connection.ts';

/**
 * SQL: whether a recording waits for a person. It failed, or its current reading is unsure and nobody has
 * reviewed it. Wants the tables aliased as `recordings` and `current_reading`.
 */
export const NEEDS_PERSON_SQL = `(recordings.state = 'failed' OR (
  recordings.state = 'done' AND current_reading.status = 'measured'
  AND current_reading.confidence < ${String(UNSURE_BELOW_CONFIDENCE)}
  AND NOT EXISTS (SELECT 1 FROM reviews WHERE reviews.bench_id = recordings.bench_id
    AND reviews.reading_id = recordings.current_reading_id)))`;

export interface RecordingCounts {
  readonly recordingCount: number;
  readonly needsPersonCount: number;
}

export const NO_RECORDINGS: RecordingCounts = { recordingCount: 0, needsPersonCount: 0 };

interface CountRow {
  readonly ownerId: string;
  readonly recordingCount: number | string;
  readonly needsPersonCount: number | string;
}

interface OwnersOfBenches {
  readonly benchIds: readonly string[];
  readonly ids: readonly string[];
}

/** How many recordings each of these builds has; a build without any is absent. */
export function countRecordingsByBuild(builds: OwnersOfBenches): Promise<Map<string, RecordingCounts>> {
  return countRecordings('build_id', builds);
}

/** The same for sessions. */
export function countRecordingsBySession(sessions: OwnersOfBenches): Promise<Map<string, RecordingCounts>> {
  return countRecordings('session_id', sessions);
}

async function countRecordings(
  ownerColumn: 'build_id' | 'session_id',
  { benchIds, ids }: OwnersOfBenches,
): Promise<Map<string, RecordingCounts>> {
  if (ids.length === 0) return new Map();
  const rows = await database.query<CountRow>(
    `SELECT recordings.${ownerColumn} AS ownerId, COUNT(*) AS recordingCount, SUM(${NEEDS_PERSON_SQL}) AS needsPersonCount
     FROM recordings LEFT JOIN readings AS current_reading
       ON current_reading.id = recordings.current_reading_id AND current_reading.bench_id = recordings.bench_id
     WHERE recordings.bench_id IN (:benchIds) AND recordings.${ownerColumn} IN (:ids)
     GROUP BY recordings.${ownerColumn}`,
    { type: QueryTypes.SELECT, replacements: { benchIds: [...benchIds], ids: [...ids] } },
  );
  return new Map(
    rows.map(({ ownerId, recordingCount, needsPersonCount }) => [
      ownerId,
      { recordingCount: Number(recordingCount), needsPersonCount: Number(needsPersonCount) },
    ]),
  );
}
