import type { SessionConditions } from '#lib/schemas/session.ts';
import { invalidFields } from '../errors.ts';
import { Build } from '../models/Build.ts';

/** What is left out of the conditions is not known. */
export function conditionColumns(conditions: SessionConditions | undefined) {
  return {
    supplyVolts: conditions?.supplyVolts ?? null,
    loadDescription: conditions?.load ?? null,
    ambientCelsius: conditions?.ambientCelsius ?? null,
    note: conditions?.note ?? null,
  };
}

/** A build of another bench looks like one that does not exist. @throws ServerError invalid-fields (buildId) */
export async function refuseForeignBuild(buildId: string | null, benchId: string): Promise<void> {
  if (buildId === null) return;
  const build = await Build.findOne({ where: { id: buildId, benchId }, attributes: ['id'] });
  if (build === null) throw invalidFields([{ field: 'buildId', message: 'There is no such build in this bench.' }]);
}
