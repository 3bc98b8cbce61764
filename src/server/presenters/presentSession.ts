import type { SessionView } from '#lib/schemas/session.ts';
import type { SessionWithBuildAndCreator } from '../models/Session.ts';
import type { Actor } from '../policies/actor.ts';
import { sessionPolicy } from '../policies/sessionPolicy.ts';

interface SessionDetails {
  readonly session: SessionWithBuildAndCreator;
  readonly recordingCount: number;
  readonly needsPersonCount: number;
}

export function presentSession({ session, ...counts }: SessionDetails, actor: Actor): SessionView {
  const { build, creator } = session;
  return {
    id: session.id,
    benchId: session.benchId,
    title: session.title,
    purpose: session.purpose,
    build: build && { id: build.id, name: build.name, revision: build.revision },
    conditions: {
      supplyVolts: session.supplyVolts,
      load: session.loadDescription,
      ambientCelsius: session.ambientCelsius,
      note: session.note,
    },
    recordingCount: counts.recordingCount,
    needsPersonCount: counts.needsPersonCount,
    createdBy: { id: creator.id, name: creator.name },
    createdAt: session.createdAt.toISOString(),
    updatedAt: session.updatedAt.toISOString(),
    abilities: {
      canEdit: sessionPolicy.canEdit(actor, session),
      canAddRecording: sessionPolicy.canAddRecording(actor, session),
    },
  };
}
