import { notFound } from '../errors.ts';
import { countRecordingsInBench, listRecordingsByBenches } from '../models/recordingDetails.ts';
import { countCameIn, listSpeedsOfSessions, type SessionSpeed } from '../models/sessionSpeeds.ts';
import type { Actor } from '../policies/actor.ts';
import type { SessionDetails } from './getSession.ts';
import { listSessions } from './listSessions.ts';
import { type RecordingDetails, withDetails } from './recordingDetails.ts';

const NEEDS_PERSON_MAXIMUM_COUNT = 5;
const RUNNING_MAXIMUM_COUNT = 20;
const SESSION_MAXIMUM_COUNT = 8;
const CAME_IN_HOURS = 24;

/** What is going on at a bench. */
export interface BenchOverview {
  readonly benchId: string;
  readonly benchName: string;
  /** In the last 24 h, by the database's clock. */
  readonly cameInCount: number;
  readonly needsPersonCount: number;
  /** The newest few of them. */
  readonly needsPerson: readonly RecordingDetails[];
  /** Waiting or being analysed, newest first. */
  readonly running: readonly RecordingDetails[];
  /** The latest sessions, each with its measured speeds, oldest first. */
  readonly sessions: readonly { readonly session: SessionDetails; readonly points: readonly SessionSpeed[] }[];
}

/** @throws ServerError not-found for a foreign bench */
export async function getBenchOverview({ actor, benchId }: { actor: Actor; benchId: string }): Promise<BenchOverview> {
  const membership = actor.memberships.find((candidate) => candidate.benchId === benchId);
  if (membership === undefined) throw notFound('bench');
  const [cameInCount, needsPersonCount, needsPerson, running, sessions] = await Promise.all([
    countCameIn(benchId, CAME_IN_HOURS),
    countRecordingsInBench(benchId, { needsPerson: true }),
    listSome(benchId, { needsPerson: true }, NEEDS_PERSON_MAXIMUM_COUNT),
    listSome(benchId, { isRunning: true }, RUNNING_MAXIMUM_COUNT),
    listSessions({ actor, benchId, limit: SESSION_MAXIMUM_COUNT }),
  ]);
  const sessionIds = sessions.items.map(({ session }) => session.id);
  const speeds = await listSpeedsOfSessions(benchId, sessionIds);
  return {
    ...{ benchId, benchName: membership.benchName, cameInCount, needsPersonCount, needsPerson, running },
    sessions: sessions.items.map((session) => ({ session, points: speeds.get(session.session.id) ?? [] })),
  };
}

async function listSome(benchId: string, filter: { needsPerson?: true; isRunning?: true }, limit: number) {
  return withDetails(await listRecordingsByBenches([benchId], { filter, limit }));
}
