import { QueryTypes } from 'sequelize';
import { UNSURE_BELOW_CONFIDENCE } from '#lib/analysis/reading.ts';
import { database } from '../database/connection.ts';

/** The speed of one recording as a dot among those of its session. */
export interface SessionSpeed {
  readonly recordingId: string;
  readonly rpm: number;
  readonly rpmLow: number;
  readonly rpmHigh: number;
  readonly isUnsure: boolean;
}

interface SpeedRow extends Omit<SessionSpeed, 'isUnsure'> {
  readonly sessionId: string;
  readonly isUnsure: number;
}

/** Measured speeds by session, oldest first; a person's choice moves speed and interval, a discarded one is left out. */
export async function listSpeedsOfSessions(
  benchId: string,
  sessionIds: readonly string[],
): Promise<Map<string, SessionSpeed[]>> {
  if (sessionIds.length === 0) return new Map();
  const rows = await database.query<SpeedRow>(
    `SELECT recordings.session_id AS sessionId, recordings.id AS recordingId,
       COALESCE(reviews.shaft_speed_rpm, readings.shaft_speed_rpm) AS rpm,
       readings.low_rpm * COALESCE(reviews.shaft_speed_rpm / readings.shaft_speed_rpm, 1) AS rpmLow,
       readings.high_rpm * COALESCE(reviews.shaft_speed_rpm / readings.shaft_speed_rpm, 1) AS rpmHigh,
       reviews.id IS NULL AND readings.confidence < ${String(UNSURE_BELOW_CONFIDENCE)} AS isUnsure
     FROM recordings
     JOIN readings ON readings.id = recordings.current_reading_id AND readings.bench_id = recordings.bench_id
     LEFT JOIN reviews ON reviews.id = (
       SELECT newest.id FROM reviews AS newest
       WHERE newest.bench_id = recordings.bench_id AND newest.reading_id = readings.id
       ORDER BY newest.created_at DESC, newest.id DESC LIMIT 1)
     WHERE recordings.bench_id = :benchId AND recordings.session_id IN (:sessionIds) AND readings.status = 'measured'
       AND (reviews.id IS NULL OR reviews.decision IN ('confirm', 'choose'))
     ORDER BY recordings.created_at, recordings.id`,
    { type: QueryTypes.SELECT, replacements: { benchId, sessionIds: [...sessionIds] } },
  );
  const speeds = new Map<string, SessionSpeed[]>();
  for (const { sessionId, isUnsure, ...speed } of rows) {
    const ofSession = speeds.get(sessionId) ?? [];
    ofSession.push({ ...speed, isUnsure: Boolean(isUnsure) });
    speeds.set(sessionId, ofSession);
  }
  return speeds;
}

/** Recordings that arrived within the last `hours`. */
export async function countCameIn(benchId: string, hours: number): Promise<number> {
  const [row] = await database.query<{ cameInCount: number | string }>(
    `SELECT COUNT(*) AS cameInCount FROM recordings
     WHERE bench_id = :benchId AND created_at > NOW(3) - INTERVAL :hours HOUR`,
    { type: QueryTypes.SELECT, replacements: { benchId, hours } },
  );
  return Number(row?.cameInCount ?? 0);
}
