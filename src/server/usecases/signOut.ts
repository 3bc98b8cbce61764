import { endAuthSession } from '../auth/authSessions.ts';
import type { Actor } from '../policies/actor.ts';
import { audit } from './audit.ts';

/** Ends a sign-in on the server; without one it does nothing, so that signing out twice is no error. */
export async function signOut(request: { actor: Actor | null; authSessionId: string | null }): Promise<void> {
  if (request.authSessionId === null) return;
  await endAuthSession(request.authSessionId);
  await audit({ action: 'sign-out.succeeded', accountId: request.actor?.account.id ?? null });
}
