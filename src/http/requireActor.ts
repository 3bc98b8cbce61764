import type { Actor } from '#server/policies/actor.ts';
import { ServerError } from '#server/errors.ts';

/**
 * Who is asking, for a page or an endpoint that only answers people it knows. The middleware has already sent
 * everyone else away (a page: to the sign-in with the way back); this is the second fence.
 *
 * @param context Astro in a page, the context in an endpoint.
 * @throws ServerError not-signed-in
 */
export function requireActor(context: { readonly locals: App.Locals }): Actor {
  const { actor } = context.locals;
  if (actor === null) {
    throw new ServerError({
      code: 'not-signed-in',
      detail: 'Sign in, or send a token in the header Authorization: Bearer TOKEN.',
    });
  }
  return actor;
}
