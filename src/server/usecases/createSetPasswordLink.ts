import { QueryTypes, type Transaction } from 'sequelize';
import { v7 as uuidV7 } from 'uuid';
import { hashOfSecret, newSecret } from '../auth/secrets.ts';
import { database } from '../database/connection.ts';
import { settings } from '../env.ts';
import { audit } from './audit.ts';

const SET_PASSWORD_LINK_MINUTES = 30;

/**
 * A link with which the holder of an account sets a password, once. Links that were made before stop working.
 *
 * @returns the address on the public site; its token is stored nowhere.
 */
export async function createSetPasswordLink(accountId: string, transaction: Transaction): Promise<string> {
  const token = newSecret();
  await database.query(
    `UPDATE single_use_links SET used_at = UTC_TIMESTAMP(3)
     WHERE account_id = ? AND purpose = 'set-password' AND used_at IS NULL`,
    { type: QueryTypes.UPDATE, replacements: [accountId], transaction },
  );
  await database.query(
    `INSERT INTO single_use_links (id, account_id, purpose, token_hash, expires_at, created_at)
     VALUES (?, ?, 'set-password', ?, TIMESTAMPADD(MINUTE, ?, UTC_TIMESTAMP(3)), UTC_TIMESTAMP(3))`,
    {
      type: QueryTypes.INSERT,
      replacements: [uuidV7(), accountId, hashOfSecret(token), SET_PASSWORD_LINK_MINUTES],
      transaction,
    },
  );
  await audit(
    { action: 'password-link.created', accountId: null, object: { type: 'account', id: accountId } },
    transaction,
  );
  return new URL(`/set-password/${token}`, settings().publicUrl).href;
}
