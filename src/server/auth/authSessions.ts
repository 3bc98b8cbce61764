import { Lucia, TimeSpan } from 'lucia';
import { authSessionAdapter } from './authSessionAdapter.ts';

/**
 * The only file that knows the authentication library: sign-ins begin, are recognised and end here.
 */
declare module 'lucia' {
  interface Register {
    Lucia: typeof lucia;
    DatabaseUserAttributes: { email: string; name: string };
  }
}

const IDLE_LIMIT = new TimeSpan(12, 'h');
/** A sign-in in use is prolonged at most this often, so that reading a page rarely writes. */
const PROLONG_INTERVAL_SECONDS = 300;

const lucia = new Lucia(authSessionAdapter, {
  sessionExpiresIn: IDLE_LIMIT,
  getUserAttributes: ({ email, name }) => ({ email, name }),
});

export interface CurrentAuthSession {
  /** The identifier in the cookie: a secret. */
  readonly id: string;
}

export interface SignedIn {
  readonly authSession: CurrentAuthSession;
  readonly account: {
    readonly id: string;
    readonly email: string;
    readonly name: string;
  };
}

/** @returns the identifier for the cookie; always a new one. */
export async function startAuthSession(accountId: string): Promise<string> {
  await lucia.deleteExpiredSessions();
  const { id } = await lucia.createSession(accountId, {});
  return id;
}

/** @returns null when the sign-in is unknown, ended, idle for 12 h, 30 days old, or its account disabled. */
export async function readAuthSession(authSessionId: string): Promise<SignedIn | null> {
  const { session, user } = await lucia.validateSession(authSessionId);
  if (session === null) return null;
  const idleSeconds = IDLE_LIMIT.seconds() - (session.expiresAt.getTime() - Date.now()) / 1000;
  if (idleSeconds > PROLONG_INTERVAL_SECONDS) {
    await authSessionAdapter.updateSessionExpiration(session.id, new Date(Date.now() + IDLE_LIMIT.milliseconds()));
  }
  return {
    authSession: { id: session.id },
    account: { id: user.id, email: user.email, name: user.name },
  };
}

export async function endAuthSession(authSessionId: string): Promise<void> {
  await lucia.invalidateSession(authSessionId);
}

/** On every change of an account's password or rights. */
export async function endAuthSessionsOf(accountId: string): Promise<void> {
  await lucia.invalidateUserSessions(accountId);
}
