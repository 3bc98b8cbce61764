import type { SignInRequest } from '#lib/schemas/account.ts';
import { endAuthSession, startAuthSession } from '../auth/authSessions.ts';
import { isPasswordOf } from '../auth/passwordHash.ts';
import { accountThrottle, addressThrottle } from '../auth/signInThrottles.ts';
import { clock } from '../clock.ts';
import { ServerError } from '../errors.ts';
import { Account } from '../models/Account.ts';
import { audit } from './audit.ts';

interface SignInAttempt extends SignInRequest {
  /** Network address of the caller. */
  readonly address: string;
  /** The sign-in that the caller's cookie held so far; it ends, so that an identifier planted there is worth nothing. */
  readonly previousAuthSessionId: string | null;
}

/**
 * Checks a password and starts a sign-in. Which half was wrong is never said: a known and an unknown account get
 * the same answer after the same work.
 *
 * @returns the identifier for the cookie.
 * @throws ServerError wrong-credentials, too-many-requests
 */
export async function signIn(attempt: SignInAttempt): Promise<{ authSessionId: string }> {
  const email = attempt.email.trim().toLowerCase();
  refuseTooMany(email, attempt.address);
  const account = await Account.loadByEmail(email);
  const isRight = await isPasswordOf(account?.passwordHash ?? null, attempt.password);
  if (account === null || !isRight || account.disabledAt !== null) {
    noteFailure(email, attempt.address);
    await audit({ action: 'sign-in.refused', accountId: account?.id ?? null });
    throw new ServerError({
      code: 'wrong-credentials',
      detail:
        'This e-mail address and this password do not belong together. Check both; capitals count in the password.',
    });
  }
  accountThrottle.noteSuccess(email);
  if (attempt.previousAuthSessionId !== null) await endAuthSession(attempt.previousAuthSessionId);
  const authSessionId = await startAuthSession(account.id);
  await audit({ action: 'sign-in.succeeded', accountId: account.id });
  return { authSessionId };
}

function refuseTooMany(email: string, address: string): void {
  const nowSeconds = clock.monotonicSeconds();
  const waitSeconds = Math.ceil(
    Math.max(accountThrottle.waitSeconds(email, nowSeconds), addressThrottle.waitSeconds(address, nowSeconds)),
  );
  if (waitSeconds === 0) return;
  throw new ServerError({
    code: 'too-many-requests',
    detail: `Too many wrong passwords. Try again in ${String(waitSeconds)} s.`,
    retryAfterSeconds: waitSeconds,
  });
}

function noteFailure(email: string, address: string): void {
  const nowSeconds = clock.monotonicSeconds();
  accountThrottle.noteFailure(email, nowSeconds);
  addressThrottle.noteFailure(address, nowSeconds);
}
