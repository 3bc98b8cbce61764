import { QueryTypes } from 'sequelize';
import type { ReviewDecision } from '#lib/schemas/reading.ts';
import { database } from '../database/connection.ts';

/** One measured recording of a session: its current reading, what a person said of it, and its conditions. */
export interface SessionPointRow {
  readonly recordingId: string;
  readonly recordedAt: Date;
  readonly buildId: string | null;
  readonly buildRevision: number | null;
  readonly buildName: string | null;
  /** Of the recording, else of the session. */
  readonly supplyVolts: number | null;
  readonly shaftSpeedRpm: number;
  readonly lowRpm: number;
  readonly highRpm: number;
  readonly confidence: number;
  readonly decision: ReviewDecision | null;
  readonly chosenRpm: number | null;
}

/** Oldest first. The newest review of a reading counts. */
export function listSessionPoints(session: { id: string; benchId: string }): Promise<SessionPointRow[]> {
  return database.query<SessionPointRow>(
    `SELECT recordings.id AS recordingId, recordings.created_at AS recordedAt,
       recordings.build_id AS buildId, recordings.build_revision AS buildRevision, builds.name AS buildName,
       COALESCE(recordings.supply_volts, sessions.supply_volts) AS supplyVolts,
       readings.shaft_speed_rpm AS shaftSpeedRpm, readings.low_rpm AS lowRpm, readings.high_rpm AS highRpm,
       readings.confidence, reviews.decision, reviews.shaft_speed_rpm AS chosenRpm
     FROM recordings
     JOIN sessions ON sessions.id = recordings.session_id AND sessions.bench_id = recordings.bench_id
     JOIN readings ON readings.id = recordings.current_reading_id AND readings.bench_id = recordings.bench_id
     LEFT JOIN builds ON builds.id = recordings.build_id AND builds.bench_id = recordings.bench_id
     LEFT JOIN reviews ON reviews.id = (
       SELECT newest.id FROM reviews AS newest
       WHERE newest.bench_id = recordings.bench_id AND newest.reading_id = readings.id
       ORDER BY newest.created_at DESC, newest.id DESC LIMIT 1)
     WHERE recordings.bench_id = :benchId AND recordings.session_id = :sessionId AND readings.status = 'measured'
     ORDER BY recordings.created_at, recordings.id`,
    { type: QueryTypes.SELECT, replacements: { benchId: session.benchId, sessionId: session.id } },
  );
}
