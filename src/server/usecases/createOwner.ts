import { inTransaction } from '../database/inTransaction.ts';
import { Account } from '../models/Account.ts';
import { Bench } from '../models/Bench.ts';
import { Membership } from '../models/Membership.ts';
import { audit } from './audit.ts';
import { createSetPasswordLink } from './createSetPasswordLink.ts';

/**
 * A new bench with its first owner, whose account is made when there is none.
 *
 * @param wanted.email checked by the caller.
 * @returns a one-time link to set the password, and the bench.
 */
export async function createOwner(wanted: {
  email: string;
  benchName: string;
}): Promise<{ link: string; benchId: string }> {
  const email = wanted.email.toLowerCase();
  return inTransaction(async (transaction) => {
    const [account] = await Account.findOrCreate({
      where: { email },
      defaults: { email, name: email.split('@')[0] ?? email },
      transaction,
    });
    const bench = await Bench.create({ name: wanted.benchName }, { transaction });
    await Membership.create({ benchId: bench.id, accountId: account.id, role: 'owner' }, { transaction });
    const object = { type: 'bench', id: bench.id };
    await audit({ action: 'bench.created', accountId: account.id, benchId: bench.id, object }, transaction);
    return { link: await createSetPasswordLink(account.id, transaction), benchId: bench.id };
  });
}
