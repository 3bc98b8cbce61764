import type { APIContext, MiddlewareHandler } from 'astro';
import { settings } from '#server/env.ts';
import { ServerError } from '#server/errors.ts';
import { sessionCookieName } from '#server/auth/sessionCookie.ts';
import { bearerToken } from '../bearerToken.ts';

const SAFE_METHODS: readonly string[] = ['GET', 'HEAD', 'OPTIONS'];

/**
 * Refuses changes that another site asks for in the name of whoever is signed in, whatever their content type.
 * A bearer token is not sent by browsers on their own, and with one the cookie is ignored.
 */
export const crossSite: MiddlewareHandler = (context, next) => {
  if (!SAFE_METHODS.includes(context.request.method) && bearerToken(context.request) === null) refuseCrossSite(context);
  return next();
};

function refuseCrossSite({ request, cookies }: APIContext): void {
  const origin = request.headers.get('origin');
  const fetchSite = request.headers.get('sec-fetch-site');
  const isFetchSiteForeign = fetchSite !== null && fetchSite !== 'same-origin';
  // Browsers send one of the two; a cookie without either comes from something that should use a token.
  const isUnproven = origin === null && fetchSite === null && cookies.has(sessionCookieName());
  if (!isFetchSiteForeign && !isUnproven && (origin === null || isOwnOrigin(origin, request))) return;
  throw new ServerError({
    code: 'cross-site',
    detail: 'Changes with the sign-in cookie must come from a page of this site. Scripts use a token instead.',
  });
}

/** The public address, or the very host that was asked: a browser sets both, and a foreign page can set neither. */
function isOwnOrigin(origin: string, request: Request): boolean {
  if (origin === new URL(settings().publicUrl).origin) return true;
  return URL.canParse(origin) && new URL(origin).host === request.headers.get('host');
}
