import type { Role } from '#lib/schemas/account.ts';

/** One bench that an account belongs to. */
export interface Membership {
  readonly benchId: string;
  readonly benchName: string;
  readonly role: Role;
}

/** Who is asking. Made once a request from the session cookie or the bearer token. */
export interface Actor {
  readonly account: { readonly id: string; readonly email: string; readonly name: string };
  readonly memberships: readonly Membership[];
  readonly via: 'session' | 'token';
  /** A read token may not change anything, whatever the role. */
  readonly access: 'read' | 'write';
}
