import type { CreateBuildRequest } from '#lib/schemas/build.ts';
import { inTransaction } from '../database/inTransaction.ts';
import { Build } from '../models/Build.ts';
import type { Actor } from '../policies/actor.ts';
import { audit } from './audit.ts';
import { benchToWriteIn } from './benchChoice.ts';
import { buildEvents } from './buildEvents.ts';
import type { BuildDetails } from './getBuild.ts';
import { refuseEmptySpeedRange } from './speedRange.ts';

/** @throws ServerError invalid-fields, forbidden, not-found (bench) */
export async function createBuild({
  actor,
  request,
}: {
  actor: Actor;
  request: CreateBuildRequest;
}): Promise<BuildDetails> {
  const benchId = benchToWriteIn(actor, request.benchId, 'contribute');
  refuseEmptySpeedRange(request.rpmMin ?? null, request.rpmMax ?? null);
  const { geometry, eventsPerTurn = null, orders } = request;
  const columns = {
    benchId,
    name: request.name,
    ...geometry,
    ...buildEvents({ geometry, eventsPerTurn, orders }),
    minimumRpm: request.rpmMin ?? null,
    maximumRpm: request.rpmMax ?? null,
    notes: request.notes ?? null,
    createdBy: actor.account.id,
  };
  const build = await inTransaction(async (transaction) => {
    const created = await Build.create(columns, { transaction });
    const object = { type: 'build', id: created.id };
    await audit({ action: 'build.created', accountId: actor.account.id, benchId, object }, transaction);
    return created;
  });
  return { build, recordingCount: 0 };
}
