import { hashOfSecret, newSecret } from '../auth/secrets.ts';
import { inTransaction } from '../database/inTransaction.ts';
import { ApiToken } from '../models/ApiToken.ts';
import { audit } from './audit.ts';

/** Lets a person, and a scanner for leaked keys, tell what the string is for. */
const TOKEN_PREFIX = 'rb_';

interface NewToken {
  readonly accountId: string;
  readonly name: string;
  readonly access: 'read' | 'write';
  /** null: until it is revoked. */
  readonly expiresAt: Date | null;
}

/** @returns the token. It is shown once: only its hash is stored. */
export async function createApiToken(wanted: NewToken): Promise<string> {
  const token = TOKEN_PREFIX + newSecret();
  await inTransaction(async (transaction) => {
    const { id } = await ApiToken.create({ ...wanted, tokenHash: hashOfSecret(token) }, { transaction });
    const object = { type: 'api-token', id };
    await audit({ action: 'token.created', accountId: wanted.accountId, object }, transaction);
  });
  return token;
}
