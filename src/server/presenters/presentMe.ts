import type { MeView } from '#lib/schemas/account.ts';
import type { Actor } from '../policies/actor.ts';

export function presentMe({ account, memberships }: Actor): MeView {
  return {
    account: { id: account.id, email: account.email, name: account.name },
    benches: memberships.map(({ benchId, benchName, role }) => ({ id: benchId, name: benchName, role })),
  };
}
