import { database } from '#server/database/connection.ts';
import { migrate } from '#server/database/migrate.ts';

/** Brings the schema to the head and names what was run. */
export async function main(): Promise<number> {
  const names = await migrate();
  for (const name of names) process.stderr.write(`migrated ${name}\n`);
  await database.close();
  return 0;
}
