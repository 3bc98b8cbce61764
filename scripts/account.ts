import { parseArgs } from 'node:util';
import * as z from 'zod/mini';
import { emailAddress } from '#lib/schemas/account.ts';
import { NAME_MAXIMUM_CHARACTERS, oneLine } from '#lib/schemas/fields.ts';
import { database } from '#server/database/connection.ts';
import { createOwner } from '#server/usecases/createOwner.ts';

const USAGE = `Usage: npm run --silent account -- --email E --bench NAME

Makes E the owner of a new bench NAME, with a new account if there is none yet, and prints a link that works once,
within 30 minutes, to set the password.
`;

const EXIT_BAD_USAGE = 2;

const optionsSchema = z.object({ email: emailAddress, bench: oneLine(NAME_MAXIMUM_CHARACTERS) });

/** `npm run account`. @returns the exit status: 0 done, 2 bad usage. */
export async function main(programArguments: string[]): Promise<number> {
  const options = parseOptions(programArguments);
  if (options === null) {
    process.stderr.write(USAGE);
    return EXIT_BAD_USAGE;
  }
  try {
    const { link } = await createOwner({ email: options.email, benchName: options.bench });
    process.stdout.write(`${link}\n`);
    return 0;
  } finally {
    await database.close();
  }
}

function parseOptions(programArguments: string[]): z.infer<typeof optionsSchema> | null {
  try {
    const { values } = parseArgs({
      args: programArguments,
      options: { email: { type: 'string' }, bench: { type: 'string' } },
    });
    return optionsSchema.safeParse(values).data ?? null;
  } catch {
    return null;
  }
}
