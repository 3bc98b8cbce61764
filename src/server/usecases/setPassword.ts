import { QueryTypes, type Transaction } from 'sequelize';
import { endAuthSessionsOf } from '../auth/authSessions.ts';
import { passwordHash } from '../auth/passwordHash.ts';
import { refuseWeakPassword } from '../auth/passwordRules.ts';
import { hashOfSecret } from '../auth/secrets.ts';
import { database } from '../database/connection.ts';
import { inTransaction } from '../database/inTransaction.ts';
import { ServerError } from '../errors.ts';
import { Account } from '../models/Account.ts';
import { audit } from './audit.ts';

interface LinkHolder {
  readonly accountId: string;
  readonly email: string;
  readonly name: string;
}

/**
 * Whose password a link sets, for the page that asks for it.
 *
 * @throws ServerError link-not-valid, the same for a link that is mistyped, used, replaced or older than 30 minutes.
 */
export async function getSetPasswordLink({ token }: { token: string }): Promise<LinkHolder> {
  const [holder] = await database.query<LinkHolder>(
    `SELECT a.id AS accountId, a.email, a.name FROM single_use_links l JOIN accounts a ON a.id = l.account_id
     WHERE l.token_hash = ? AND l.purpose = 'set-password' AND l.used_at IS NULL
       AND l.expires_at > UTC_TIMESTAMP(3) AND a.disabled_at IS NULL`,
    { type: QueryTypes.SELECT, replacements: [hashOfSecret(token)] },
  );
  if (holder === undefined) throw linkNotValid();
  return holder;
}

/**
 * Uses the link up: sets the password and ends every sign-in of the account.
 *
 * @returns the account's address, to sign in with.
 * @throws ServerError link-not-valid, invalid-fields (password), too-many-requests
 */
export async function setPassword(request: { token: string; password: string }): Promise<{ email: string }> {
  const holder = await getSetPasswordLink({ token: request.token });
  refuseWeakPassword(request.password, holder);
  const newHash = await passwordHash(request.password);
  await inTransaction(async (transaction) => {
    await useUp(request.token, transaction);
    await Account.update({ passwordHash: newHash }, { where: { id: holder.accountId }, transaction });
    await audit({ action: 'password.set', accountId: holder.accountId }, transaction);
  });
  await endAuthSessionsOf(holder.accountId);
  return { email: holder.email };
}

/** Of two that use one link at the same time, one finds it used. */
async function useUp(token: string, transaction: Transaction): Promise<void> {
  const [, changedCount] = await database.query(
    'UPDATE single_use_links SET used_at = UTC_TIMESTAMP(3) WHERE token_hash = ? AND used_at IS NULL',
    { type: QueryTypes.UPDATE, replacements: [hashOfSecret(token)], transaction },
  );
  if (changedCount !== 1) throw linkNotValid();
}

function linkNotValid(): ServerError {
  return new ServerError({
    code: 'link-not-valid',
    detail: 'This link was used, replaced by a newer one, or is older than 30 minutes. Ask for a new one.',
  });
}
