import { parseArgs } from 'node:util';
import { NAME_MAXIMUM_CHARACTERS } from '#lib/schemas/fields.ts';
import { database } from '#server/database/connection.ts';
import { Account } from '#server/models/Account.ts';
import { createApiToken } from '#server/usecases/createApiToken.ts';

const USAGE = `Usage: npm run --silent token -- --email E --name N [--read]

Prints a new API token for the account E and nothing else. N is what the token is for.
--read makes one that may read but not change anything.
`;

const EXIT_UNKNOWN_ACCOUNT = 1;
const EXIT_BAD_USAGE = 2;

interface Options {
  readonly email: string;
  readonly name: string;
  readonly access: 'read' | 'write';
}

/** `npm run token`. @returns the exit status: 0 done, 1 unknown account, 2 bad usage. */
export async function main(programArguments: string[]): Promise<number> {
  const options = parseOptions(programArguments);
  if (options === null) {
    process.stderr.write(USAGE);
    return EXIT_BAD_USAGE;
  }
  try {
    return await printToken(options);
  } finally {
    await database.close();
  }
}

async function printToken({ email, name, access }: Options): Promise<number> {
  const account = await Account.loadByEmail(email);
  if (account?.disabledAt !== null) {
    process.stderr.write(`There is no account ${email}. Make one with: npm run account -- --email E --bench NAME\n`);
    return EXIT_UNKNOWN_ACCOUNT;
  }
  const token = await createApiToken({ accountId: account.id, name, access, expiresAt: null });
  process.stdout.write(`${token}\n`);
  return 0;
}

function parseOptions(programArguments: string[]): Options | null {
  try {
    const { values } = parseArgs({
      args: programArguments,
      options: { email: { type: 'string' }, name: { type: 'string' }, read: { type: 'boolean', default: false } },
    });
    const { email = '', name = '', read } = values;
    if (email.trim() === '' || name.trim() === '' || name.length > NAME_MAXIMUM_CHARACTERS) return null;
    return { email: email.trim(), name: name.trim(), access: read ? 'read' : 'write' };
  } catch {
    return null;
  }
}
