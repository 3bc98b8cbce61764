import { QueryTypes } from 'sequelize';
import { database } from '../database/connection.ts';
import { Membership } from '../models/Membership.ts';
import type { Actor } from '../policies/actor.ts';
import { type CurrentAuthSession, readAuthSession } from './authSessions.ts';
import { hashOfSecret } from './secrets.ts';

export async function actorOfAuthSession(
  authSessionId: string,
): Promise<{ actor: Actor; authSession: CurrentAuthSession } | null> {
  const signedIn = await readAuthSession(authSessionId);
  if (signedIn === null) return null;
  const { account, authSession } = signedIn;
  const memberships = await listMemberships(account.id);
  return {
    actor: { account, memberships, via: 'session', access: 'write' },
    authSession,
  };
}

interface TokenRow {
  readonly tokenId: string;
  readonly access: 'read' | 'write';
  readonly accountId: string;
  readonly email: string;
  readonly name: string;
}

/** @returns null for a token that is unknown, expired or revoked, or whose account is disabled. */
export async function actorOfToken(token: string): Promise<Actor | null> {
  const [row] = await database.query<TokenRow>(
    `SELECT t.id AS tokenId, t.access, a.id AS accountId, a.email, a.name
     FROM api_tokens t JOIN accounts a ON a.id = t.account_id
     WHERE t.token_hash = ? AND t.revoked_at IS NULL AND a.disabled_at IS NULL
       AND (t.expires_at IS NULL OR t.expires_at > UTC_TIMESTAMP(3))`,
    { type: QueryTypes.SELECT, replacements: [hashOfSecret(token)] },
  );
  if (row === undefined) return null;
  await noteTokenUse(row.tokenId);
  const memberships = await listMemberships(row.accountId);
  const account = { id: row.accountId, email: row.email, name: row.name };
  return { account, memberships, via: 'token', access: row.access };
}

/** Good to the hour, so that a busy script does not write with every call. */
async function noteTokenUse(tokenId: string): Promise<void> {
  await database.query(
    `UPDATE api_tokens SET last_used_at = UTC_TIMESTAMP(3)
     WHERE id = ? AND (last_used_at IS NULL OR last_used_at < TIMESTAMPADD(HOUR, -1, UTC_TIMESTAMP(3)))`,
    { type: QueryTypes.UPDATE, replacements: [tokenId] },
  );
}

async function listMemberships(accountId: string): Promise<Actor['memberships']> {
  const memberships = await Membership.listByAccount(accountId);
  return memberships.map(({ benchId, bench, role }) => ({
    benchId,
    benchName: bench.name,
    role,
  }));
}
