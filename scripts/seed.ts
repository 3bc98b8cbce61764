import { database } from '#server/database/connection.ts';
import { withDatabaseLock } from '#server/database/withDatabaseLock.ts';
import { settings } from '#server/env.ts';
import { closeBell } from '#server/queue/ringWorkers.ts';
import { ensureDemoBench } from './demo/demoAccounts.ts';
import { seedScenario } from './demo/seedScenario.ts';

/** Makes the demo bench where it is wanted; does nothing where it is there already. @returns the exit status */
export async function main(): Promise<number> {
  if (!settings().hasDemo) return 0;
  try {
    await withDatabaseLock('seed', seed);
    return 0;
  } finally {
    closeBell();
    await database.close();
  }
}

async function seed(): Promise<void> {
  const uploadCount = await seedScenario(await ensureDemoBench());
  if (uploadCount > 0) process.stderr.write(`made the demo bench with ${uploadCount} recordings\n`);
}
