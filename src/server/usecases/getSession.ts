import { notFound } from '../errors.ts';
import { countRecordingsBySession, NO_RECORDINGS, type RecordingCounts } from '../models/recordingCounts.ts';
import { Session, type SessionWithBuildAndCreator } from '../models/Session.ts';
import { readableBenchIds } from '../policies/abilities.ts';
import type { Actor } from '../policies/actor.ts';

/** A session with what its page tells about it. */
export interface SessionDetails extends RecordingCounts {
  readonly session: SessionWithBuildAndCreator;
}

/** @throws ServerError not-found */
export async function getSession({ actor, sessionId }: { actor: Actor; sessionId: string }): Promise<SessionDetails> {
  const session = await loadReadableSession(actor, sessionId);
  const [details] = await withSessionCounts([session]);
  return details ?? { session, ...NO_RECORDINGS };
}

/** The bench belongs to the question: a foreign session is not there. @throws ServerError not-found */
export async function loadReadableSession(actor: Actor, sessionId: string): Promise<SessionWithBuildAndCreator> {
  const session = await Session.loadByIdInBenches(sessionId, readableBenchIds(actor));
  if (session === null) throw notFound('session');
  return session;
}

export async function withSessionCounts(sessions: readonly SessionWithBuildAndCreator[]): Promise<SessionDetails[]> {
  const counts = await countRecordingsBySession({
    benchIds: [...new Set(sessions.map(({ benchId }) => benchId))],
    ids: sessions.map(({ id }) => id),
  });
  return sessions.map((session) => ({ session, ...(counts.get(session.id) ?? NO_RECORDINGS) }));
}
