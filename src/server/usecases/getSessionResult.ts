import type { SessionResultView } from '#lib/schemas/session.ts';
import { listSessionPoints, type SessionPointRow } from '../models/sessionPoints.ts';
import type { Actor } from '../policies/actor.ts';
import { loadReadableSession } from './getSession.ts';
import { type SessionPoint, sessionVerdict } from './sessionVerdict.ts';

/**
 * What the recordings of a session say together, by its purpose.
 *
 * @throws ServerError not-found
 */
export async function getSessionResult(wanted: { actor: Actor; sessionId: string }): Promise<SessionResultView> {
  const session = await loadReadableSession(wanted.actor, wanted.sessionId);
  const rows = await listSessionPoints(session);
  const points = rows.filter(isCounted).map(pointOf);
  return {
    sessionId: session.id,
    purpose: session.purpose,
    ...sessionVerdict(session.purpose, points),
    measuredCount: points.length,
    points: points.map(presentPoint),
  };
}

/** Which revision of which build it was is only for the reckoning. */
function presentPoint(point: SessionPoint): SessionResultView['points'][number] {
  const { recordingId, recordedAt, buildName, supplyVolts, rpm, rpmLow, rpmHigh, confidence, reviewed } = point;
  return { recordingId, recordedAt, buildName, supplyVolts, rpm, rpmLow, rpmHigh, confidence, reviewed };
}

/** A person may say that nothing turned, or that the recording is no good. */
function isCounted({ decision }: SessionPointRow): boolean {
  return decision !== 'nothing-turning' && decision !== 'record-again';
}

function pointOf(row: SessionPointRow): SessionPoint {
  // Another multiple of the same line was measured as sharply: the interval moves along.
  const factor = row.decision === 'choose' && row.chosenRpm !== null ? row.chosenRpm / row.shaftSpeedRpm : 1;
  return {
    recordingId: row.recordingId,
    recordedAt: row.recordedAt.toISOString(),
    buildName: row.buildName,
    motor: row.buildId === null ? null : `${row.buildId} ${String(row.buildRevision)}`,
    supplyVolts: row.supplyVolts,
    rpm: row.shaftSpeedRpm * factor,
    rpmLow: row.lowRpm * factor,
    rpmHigh: row.highRpm * factor,
    confidence: row.confidence,
    reviewed: row.decision !== null,
  };
}
