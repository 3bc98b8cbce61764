import { forbidden, invalidFields, notFound } from '../errors.ts';
import { type Ability, canInBench, readableBenchIds } from '../policies/abilities.ts';
import type { Actor } from '../policies/actor.ts';

/**
 * The bench that a new record goes into: the one that is named, or the only one there is.
 *
 * @throws ServerError invalid-fields when several are possible and none is named, not-found for a foreign bench,
 *   forbidden when the role there does not allow it.
 */
export function benchToWriteIn(actor: Actor, benchId: string | undefined, ability: Ability): string {
  const benchIds = readableBenchIds(actor);
  if (benchId !== undefined && !benchIds.includes(benchId)) throw notFound('bench');
  const chosen = benchId ?? (benchIds.length === 1 ? benchIds[0] : undefined);
  if (chosen === undefined) {
    throw invalidFields([
      {
        field: 'benchId',
        message: 'You belong to several benches: say which one.',
      },
    ]);
  }
  if (!canInBench(actor, chosen, ability)) throw forbidden();
  return chosen;
}

/** The benches that a list covers: the one that is named, or all that the actor may read. */
export function benchesToReadIn(actor: Actor, benchId: string | undefined): string[] {
  const benchIds = readableBenchIds(actor);
  if (benchId === undefined) return benchIds;
  if (!benchIds.includes(benchId)) throw notFound('bench');
  return [benchId];
}
