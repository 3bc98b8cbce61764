import type { Role } from '#lib/schemas/account.ts';
import type { Actor } from './actor.ts';

/**
 * What a role lets its holder do in a bench. `contribute` adds builds, sessions and recordings and changes one's own;
 * `edit-any` changes those of others too.
 */
const ROLES_BY_ABILITY = {
  read: ['owner', 'lead', 'member', 'viewer'],
  contribute: ['owner', 'lead', 'member'],
  'edit-any': ['owner', 'lead'],
  review: ['owner', 'lead'],
} as const satisfies Record<string, readonly Role[]>;

export type Ability = keyof typeof ROLES_BY_ABILITY;

export function roleHasAbility(role: Role, ability: Ability): boolean {
  return (ROLES_BY_ABILITY[ability] as readonly Role[]).includes(role);
}

/** Whether the actor may do this in that bench; a read token only reads, whatever the role. */
export function canInBench(actor: Actor, benchId: string, ability: Ability): boolean {
  if (actor.access === 'read' && ability !== 'read') return false;
  const membership = actor.memberships.find((candidate) => candidate.benchId === benchId);
  return membership !== undefined && roleHasAbility(membership.role, ability);
}

/** The benches that the actor may read: every query on a tenant table is bounded by them. */
export function readableBenchIds(actor: Actor): string[] {
  return actor.memberships.filter(({ role }) => roleHasAbility(role, 'read')).map(({ benchId }) => benchId);
}
