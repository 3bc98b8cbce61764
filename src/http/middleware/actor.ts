import type { MiddlewareHandler } from 'astro';
import { actorOfAuthSession, actorOfToken } from '#server/auth/loadActor.ts';
import { sessionCookieName } from '#server/auth/sessionCookie.ts';
import { ServerError } from '#server/errors.ts';
import { ruleOf } from '#server/policies/policyTable.ts';
import { bearerToken } from '../bearerToken.ts';
import { callOf } from './access.ts';

/** Finds out who is asking, by the token if there is one, otherwise by the cookie. Probes are nobody's. */
export const actor: MiddlewareHandler = async (context, next) => {
  const { locals, request, cookies } = context;
  // Astro runs the middleware again for its error pages; they keep what was found.
  locals.actor ??= null;
  locals.authSession ??= null;
  const rule = ruleOf(callOf(context));
  if (rule === undefined || rule.audience === 'probe') return next();
  const token = bearerToken(request);
  if (token !== null) {
    locals.actor = await actorOfToken(token);
    if (locals.actor === null) throw tokenNotValid();
    return next();
  }
  const authSessionId = cookies.get(sessionCookieName())?.value;
  if (authSessionId !== undefined && authSessionId !== '') {
    const found = await actorOfAuthSession(authSessionId);
    locals.actor = found?.actor ?? null;
    locals.authSession = found?.authSession ?? null;
  }
  return next();
};

function tokenNotValid(): ServerError {
  return new ServerError({
    code: 'not-signed-in',
    detail: 'The token is not valid: it is mistyped, expired or revoked. Make a new one.',
  });
}
