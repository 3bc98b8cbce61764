import { v4 as uuidV4 } from 'uuid';
import { ROLES, type Role } from '#lib/schemas/account.ts';
import { passwordHash } from '#server/auth/passwordHash.ts';
import { Account } from '#server/models/Account.ts';
import { Bench } from '#server/models/Bench.ts';
import { Membership } from '#server/models/Membership.ts';
import { createApiToken } from '#server/usecases/createApiToken.ts';

/** Good for every account that a test makes; hashed once, because that is made to be slow. */
export const TEST_PASSWORD = 'seven brushes under glass';
let testPasswordHash: Promise<string> | undefined;

export interface TestAccount {
  readonly id: string;
  readonly email: string;
  readonly name: string;
  /** A bearer token that may read and write. */
  readonly token: string;
}

export interface TestBench extends Readonly<Record<Role, TestAccount>> {
  readonly benchId: string;
  readonly benchName: string;
}

/** An account of nobody's bench, with TEST_PASSWORD and a token. */
export async function createAccount(options: { name?: string; access?: 'read' | 'write' } = {}): Promise<TestAccount> {
  const { name = 'Tin Washer', access = 'write' } = options;
  testPasswordHash ??= passwordHash(TEST_PASSWORD);
  const email = `${uuidV4()}@test.example`;
  const account = await Account.create({ email, name, passwordHash: await testPasswordHash });
  const token = await createApiToken({ accountId: account.id, name: 'test', access, expiresAt: null });
  return { id: account.id, email, name, token };
}

/** A bench of its own with one account of every role, so that tests never meet. */
export async function createBenchWithAccounts(benchName = 'Test bench'): Promise<TestBench> {
  const bench = await Bench.create({ name: benchName });
  const accounts: [Role, TestAccount][] = [];
  for (const role of ROLES) {
    const account = await createAccount({ name: `The ${role}` });
    await addMember(bench.id, account, role);
    accounts.push([role, account]);
  }
  return { benchId: bench.id, benchName, ...(Object.fromEntries(accounts) as Record<Role, TestAccount>) };
}

export async function addMember(benchId: string, account: TestAccount, role: Role): Promise<void> {
  await Membership.create({ benchId, accountId: account.id, role });
}
