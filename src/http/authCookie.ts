import type { AstroCookies } from 'astro';
import { isSecureSite, sessionCookieName } from '#server/auth/sessionCookie.ts';

/** As long as a sign-in can last; the server ends idle ones much earlier. */
const MAXIMUM_AGE_SECONDS = 30 * 24 * 3600;

export function setAuthCookie(cookies: AstroCookies, authSessionId: string): void {
  cookies.set(sessionCookieName(), authSessionId, { ...attributes(), maxAge: MAXIMUM_AGE_SECONDS });
}

export function clearAuthCookie(cookies: AstroCookies): void {
  cookies.delete(sessionCookieName(), attributes());
}

function attributes() {
  return { httpOnly: true, secure: isSecureSite(), sameSite: 'lax', path: '/' } as const;
}
