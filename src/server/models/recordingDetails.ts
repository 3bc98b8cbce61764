import { type Includeable, literal, Op, type WhereOptions } from 'sequelize';
import type { RecordingStatus } from '#lib/schemas/recording.ts';
import { afterCursor, NEWEST_FIRST } from '../database/pageCursor.ts';
import type { Account } from './Account.ts';
import type { Build } from './Build.ts';
import type { Reading } from './Reading.ts';
import { Recording } from './Recording.ts';
import { NEEDS_PERSON_SQL } from './recordingCounts.ts';

/** A recording with everything that its row points at. */
export type RecordingWithRelations = Recording & {
  build: Build | null;
  uploader: Account;
  currentReading: Reading | null;
};

export interface RecordingFilter {
  readonly sessionId?: string | undefined;
  readonly buildId?: string | undefined;
  readonly status?: RecordingStatus | undefined;
  readonly needsPerson?: boolean | undefined;
  /** Waiting or being analysed. */
  readonly isRunning?: true | undefined;
}

const RELATIONS: Includeable[] = [
  { association: 'build' },
  { association: 'uploader', attributes: ['id', 'name'], required: true },
  { association: 'currentReading' },
];

/** Correlated with the outer query, whose table Sequelize calls `recording`. */
const NEEDS_PERSON = `EXISTS (
  SELECT 1 FROM recordings LEFT JOIN readings AS current_reading
    ON current_reading.id = recordings.current_reading_id AND current_reading.bench_id = recordings.bench_id
  WHERE recordings.id = recording.id AND recordings.bench_id = recording.bench_id AND ${NEEDS_PERSON_SQL})`;

export async function loadRecordingInBenches(
  id: string,
  benchIds: readonly string[],
): Promise<RecordingWithRelations | null> {
  const recording = await Recording.findOne({ where: { id, benchId: [...benchIds] }, include: RELATIONS });
  return recording as RecordingWithRelations | null;
}

/** Newest first, after the cursor of an earlier page. */
export async function listRecordingsByBenches(
  benchIds: readonly string[],
  { filter, limit, cursor }: { filter: RecordingFilter; limit: number; cursor?: string | undefined },
): Promise<RecordingWithRelations[]> {
  const recordings = await Recording.findAll({
    where: { [Op.and]: [{ benchId: [...benchIds] }, ...conditionsOf(filter), afterCursor(cursor)] },
    include: RELATIONS,
    order: NEWEST_FIRST,
    limit,
  });
  return recordings as RecordingWithRelations[];
}

/** How many recordings of a bench fit the filter. */
export function countRecordingsInBench(benchId: string, filter: RecordingFilter): Promise<number> {
  return Recording.count({ where: { [Op.and]: [{ benchId }, ...conditionsOf(filter)] } });
}

function conditionsOf({ sessionId, buildId, status, needsPerson, isRunning }: RecordingFilter): WhereOptions[] {
  return [
    ...(sessionId === undefined ? [] : [{ sessionId }]),
    ...(buildId === undefined ? [] : [{ buildId }]),
    ...(status === undefined ? [] : [{ state: status }]),
    ...(isRunning === undefined ? [] : [{ state: ['queued', 'working'] }]),
    ...(needsPerson === undefined ? [] : [literal(needsPerson ? NEEDS_PERSON : `NOT ${NEEDS_PERSON}`)]),
  ];
}
