import { eventsPerTurnFromGeometry } from '#lib/motor/eventsPerTurn.ts';
import type { BuildView } from '#lib/schemas/build.ts';
import type { Build } from '../models/Build.ts';
import type { Actor } from '../policies/actor.ts';
import { buildPolicy } from '../policies/buildPolicy.ts';

export function presentBuild(details: { build: Build; recordingCount: number }, actor: Actor): BuildView {
  const { build, recordingCount } = details;
  const { geometry } = build;
  return {
    id: build.id,
    benchId: build.benchId,
    name: build.name,
    revision: build.revision,
    geometry,
    eventsPerTurn: build.eventsPerTurn,
    eventsPerTurnOrigin: build.eventsPerTurnOrigin,
    eventsPerTurnExplanation:
      build.eventsPerTurnOrigin === 'geometry'
        ? eventsPerTurnFromGeometry(geometry).explanation
        : 'Given by hand, not computed from the geometry.',
    orders: build.orders,
    rpmMin: build.minimumRpm,
    rpmMax: build.maximumRpm,
    notes: build.notes,
    recordingCount,
    createdAt: build.createdAt.toISOString(),
    updatedAt: build.updatedAt.toISOString(),
    abilities: { canEdit: buildPolicy.canEdit(actor, build) },
  };
}
