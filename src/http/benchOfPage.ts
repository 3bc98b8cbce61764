import type { AstroGlobal } from 'astro';
import { notFound } from '#server/errors.ts';
import { canInBench } from '#server/policies/abilities.ts';
import type { Membership } from '#server/policies/actor.ts';
import { requireActor } from './requireActor.ts';

/**
 * The bench that a page shows: the one of `?bench=`, otherwise the first that the reader belongs to.
 *
 * @throws ServerError not-signed-in, or not-found for a foreign bench and for somebody without any.
 */
export function benchOfPage(context: Pick<AstroGlobal, 'locals' | 'url'>): Membership {
  const { memberships } = requireActor(context);
  const benchId = context.url.searchParams.get('bench');
  const bench = benchId === null ? memberships[0] : memberships.find((membership) => membership.benchId === benchId);
  if (bench === undefined) throw notFound('bench');
  return bench;
}

/** The bench of a record that the reader may see, for the frame of its page. */
export function benchNameOf(context: Pick<AstroGlobal, 'locals'>, benchId: string): string {
  const { memberships } = requireActor(context);
  return memberships.find((membership) => membership.benchId === benchId)?.benchName ?? 'Bench';
}

/** Whether the reader may add builds, sessions and recordings to the bench that the page shows. */
export function canContribute(context: Pick<AstroGlobal, 'locals' | 'url'>): boolean {
  return canInBench(requireActor(context), benchOfPage(context).benchId, 'contribute');
}
