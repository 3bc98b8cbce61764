import type { APIContext } from 'astro';
import { actorOfAuthSession, actorOfToken } from '#server/auth/loadActor.ts';
import type { Actor } from '#server/policies/actor.ts';
import { bearerToken } from './bearerToken.ts';

/**
 * Who is asking, looked up once more: an upload or a stream may outlive the sign-in, the token or the role that it
 * began with.
 *
 * @returns null when the sign-in or the token does not hold any more
 */
export async function reloadActor({ request, locals }: Pick<APIContext, 'request' | 'locals'>): Promise<Actor | null> {
  const token = bearerToken(request);
  if (token !== null) return actorOfToken(token);
  if (locals.authSession === null) return null;
  return (await actorOfAuthSession(locals.authSession.id))?.actor ?? null;
}
