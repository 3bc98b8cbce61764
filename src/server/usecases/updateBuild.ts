import type { Geometry, UpdateBuildRequest } from '#lib/schemas/build.ts';
import { inTransaction } from '../database/inTransaction.ts';
import { forbidden } from '../errors.ts';
import { Build } from '../models/Build.ts';
import type { Actor } from '../policies/actor.ts';
import { buildPolicy } from '../policies/buildPolicy.ts';
import { audit } from './audit.ts';
import { buildEvents } from './buildEvents.ts';
import { type BuildDetails, getBuild, loadReadableBuild } from './getBuild.ts';
import { refuseEmptySpeedRange } from './speedRange.ts';

interface UpdateBuild {
  readonly actor: Actor;
  readonly buildId: string;
  readonly changes: UpdateBuildRequest;
}

/**
 * Changes what is named. Another geometry raises the revision, so that recordings stay tied to the motor as it was
 * when they were made; one that the events per turn were computed from moves them along.
 *
 * @throws ServerError not-found, forbidden, invalid-fields
 */
export async function updateBuild({ actor, buildId, changes }: UpdateBuild): Promise<BuildDetails> {
  const readable = await loadReadableBuild(actor, buildId);
  if (!buildPolicy.canEdit(actor, readable)) throw forbidden();
  const where = { id: readable.id, benchId: readable.benchId };
  await inTransaction(async (transaction) => {
    // Two changes at once must not both raise the revision from the same number.
    const build = await Build.findOne({ where, transaction, lock: transaction.LOCK.UPDATE, rejectOnEmpty: true });
    const columns = changedColumns(build, changes);
    await Build.update(columns, { where, transaction });
    const object = { type: 'build', id: build.id };
    const details = { revision: columns.revision };
    const line = { action: 'build.changed', accountId: actor.account.id, benchId: build.benchId, object, details };
    await audit(line, transaction);
  });
  return getBuild({ actor, buildId });
}

function changedColumns(build: Build, changes: UpdateBuildRequest) {
  const before = build.geometry;
  const geometry = changes.geometry ?? before;
  const isRebuilt = Object.entries(geometry).some(([part, count]) => before[part as keyof Geometry] !== count);
  const minimumRpm = changes.rpmMin === undefined ? build.minimumRpm : changes.rpmMin;
  const maximumRpm = changes.rpmMax === undefined ? build.maximumRpm : changes.rpmMax;
  refuseEmptySpeedRange(minimumRpm, maximumRpm);
  return {
    name: changes.name ?? build.name,
    ...geometry,
    revision: build.revision + (isRebuilt ? 1 : 0),
    ...eventsAfter(build, changes, geometry),
    minimumRpm,
    maximumRpm,
    notes: changes.notes === undefined ? build.notes : changes.notes,
  };
}

/** null asks for the geometry again; what was given before stays until then. */
function eventsAfter(build: Build, changes: UpdateBuildRequest, geometry: Geometry) {
  const isAboutEvents = [changes.geometry, changes.eventsPerTurn, changes.orders].some(
    (change) => change !== undefined,
  );
  if (!isAboutEvents) return {};
  const givenBefore = build.eventsPerTurnOrigin === 'given' ? build.eventsPerTurn : null;
  const eventsPerTurn = changes.eventsPerTurn === undefined ? givenBefore : changes.eventsPerTurn;
  const isSameNumber = eventsPerTurn !== null && eventsPerTurn === build.eventsPerTurn;
  const orders = changes.orders ?? (isSameNumber ? build.orders : undefined);
  return buildEvents({ geometry, eventsPerTurn, orders });
}
