import { settings } from '../env.ts';

/** Browsers keep the `__Host-` prefix to HTTPS; on loopback HTTP the plain name has to do. */
export function isSecureSite(): boolean {
  return settings().publicUrl.startsWith('https:');
}

export function sessionCookieName(): string {
  return isSecureSite() ? '__Host-ripplebench' : 'ripplebench';
}
