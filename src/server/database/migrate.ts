import { QueryTypes } from 'sequelize';
import { SequelizeStorage, Umzug } from 'umzug';
import { database } from './connection.ts';
import type { Migration } from './migration.ts';
import * as firstSchema from './migrations/20261201-0001-first-schema.ts';
import * as workers from './migrations/20261201-0002-workers.ts';

/** Oldest first. Listed by hand so that the bundle carries them; a test compares the list with the folder. */
export const MIGRATIONS: readonly Migration[] = [firstSchema, workers];

const MIGRATION_LOCK = 'ripplebench.migrate';
const LOCK_WAIT_SECONDS = 60;

/**
 * Brings the schema to the head. Forward only; two processes that start at once wait for each other.
 * @returns the names of the migrations that were run.
 */
export async function migrate(): Promise<string[]> {
  return database.transaction(async (transaction) => {
    // The lock belongs to this transaction's connection; DDL runs on others.
    const select = { type: QueryTypes.SELECT, transaction } as const;
    await database.query('SELECT GET_LOCK(?, ?)', { ...select, replacements: [MIGRATION_LOCK, LOCK_WAIT_SECONDS] });
    try {
      const umzug = new Umzug({
        migrations: MIGRATIONS.map(({ name, steps }) => ({
          name,
          up: async () => {
            for (const step of steps) await database.query(step);
          },
        })),
        storage: new SequelizeStorage({ sequelize: database, tableName: 'schema_migrations' }),
        logger: undefined,
      });
      return (await umzug.up()).map(({ name }) => name);
    } finally {
      await database.query('SELECT RELEASE_LOCK(?)', { ...select, replacements: [MIGRATION_LOCK] });
    }
  });
}
