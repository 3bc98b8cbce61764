import { QueryTypes } from 'sequelize';
import type { Role } from '#lib/schemas/account.ts';
import { database } from '../database/connection.ts';

/** What somebody who keeps a stream open came in with: the hash of the cookie's or the token's secret. */
export interface Credential {
  readonly via: 'session' | 'token';
  readonly secretHash: Buffer;
}

export interface ReaderRight {
  readonly via: Credential['via'];
  readonly secretHash: Buffer;
  readonly benchId: string;
  readonly role: Role;
}

/**
 * The memberships behind all of these credentials that still hold, in one query. Asking does not prolong a sign-in.
 */
export async function listReaderRights(credentials: readonly Credential[]): Promise<ReaderRight[]> {
  const hashesOf = (via: Credential['via']) =>
    credentials.filter((credential) => credential.via === via).map(({ secretHash }) => secretHash);
  // An IN list must not be empty; no hash is that short.
  const none = Buffer.alloc(1);
  return database.query<ReaderRight>(
    `SELECT holders.via, holders.secretHash, memberships.bench_id AS benchId, memberships.role
     FROM (
       SELECT 'session' AS via, id_hash AS secretHash, account_id FROM auth_sessions
       WHERE id_hash IN (:sessionHashes) AND expires_at > UTC_TIMESTAMP(3)
       UNION ALL
       SELECT 'token', token_hash, account_id FROM api_tokens
       WHERE token_hash IN (:tokenHashes) AND revoked_at IS NULL
         AND (expires_at IS NULL OR expires_at > UTC_TIMESTAMP(3))
     ) AS holders
     JOIN accounts ON accounts.id = holders.account_id AND accounts.disabled_at IS NULL
     JOIN memberships ON memberships.account_id = accounts.id`,
    {
      type: QueryTypes.SELECT,
      replacements: {
        sessionHashes: [none, ...hashesOf('session')],
        tokenHashes: [none, ...hashesOf('token')],
      },
    },
  );
}
