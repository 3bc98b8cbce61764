import type { Role } from '#lib/schemas/account.ts';
import { passwordHash } from '#server/auth/passwordHash.ts';
import { inTransaction } from '#server/database/inTransaction.ts';
import { Account } from '#server/models/Account.ts';
import { AuditEntry } from '#server/models/AuditEntry.ts';
import { Bench } from '#server/models/Bench.ts';
import { Membership } from '#server/models/Membership.ts';
import type { Actor } from '#server/policies/actor.ts';
import { audit } from '#server/usecases/audit.ts';

/** Well known, so the demo exists only while the server listens on loopback. The README lists it. */
export const DEMO_PASSWORD = 'ripple-at-the-bench-2026';

const BENCH_NAME = 'Reed Lane Model Club';
const BENCH_CREATED = 'demo.bench-created';

interface DemoAccount {
  readonly email: string;
  readonly name: string;
  readonly role: Role;
}

export const DEMO_ACCOUNTS = [
  { email: 'owner@ripplebench.example', name: 'Ines Halder', role: 'owner' },
  { email: 'lead@ripplebench.example', name: 'Tomas Wrenfield', role: 'lead' },
  { email: 'member@ripplebench.example', name: 'Aiko Lundgren', role: 'member' },
  { email: 'viewer@ripplebench.example', name: 'Sam Okoroe', role: 'viewer' },
] as const satisfies readonly DemoAccount[];

/** The people of the demo bench as actors of use cases, by role. */
export type DemoActors = Readonly<Record<Role, Actor>>;

/** Makes the demo bench with its accounts, or finds the one that was made before, whatever it is called by now. */
export async function ensureDemoBench(): Promise<DemoActors> {
  const accounts = await Promise.all(DEMO_ACCOUNTS.map(ensureAccount));
  const made = await AuditEntry.findOne({ where: { action: BENCH_CREATED } });
  const found = made?.benchId ? await Bench.findByPk(made.benchId) : null;
  const bench = found ?? (await createBench(accounts));
  const actors = DEMO_ACCOUNTS.map(({ role, email, name }, index): [Role, Actor] => {
    const membership = { benchId: bench.id, benchName: bench.name, role };
    const account = { id: accounts[index]?.id ?? '', email, name };
    return [role, { account, memberships: [membership], via: 'session', access: 'write' }];
  });
  return Object.fromEntries(actors) as Record<Role, Actor>;
}

/** An account that is there already keeps its password. */
async function ensureAccount({ email, name }: DemoAccount): Promise<Account> {
  const known = await Account.loadByEmail(email);
  return known ?? Account.create({ email, name, passwordHash: await passwordHash(DEMO_PASSWORD) });
}

function createBench(accounts: readonly Account[]): Promise<Bench> {
  return inTransaction(async (transaction) => {
    const bench = await Bench.create({ name: BENCH_NAME }, { transaction });
    const memberships = accounts.map(({ id: accountId }, index) => ({
      benchId: bench.id,
      accountId,
      role: DEMO_ACCOUNTS[index]?.role ?? 'viewer',
    }));
    await Membership.bulkCreate(memberships, { transaction });
    await audit({ action: BENCH_CREATED, accountId: null, benchId: bench.id }, transaction);
    return bench;
  });
}
