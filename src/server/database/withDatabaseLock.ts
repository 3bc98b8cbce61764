import { QueryTypes } from 'sequelize';
import { database } from './connection.ts';

/**
 * Runs `work` while this process alone holds a named lock of the database, and not at all when another holds it. The
 * lock belongs to a connection of its own, so it goes away with the process.
 *
 * @param name unique within the application; the lock is per database, not per server
 * @returns the result of `work`; null when the lock was taken
 */
export async function withDatabaseLock<Result>(name: string, work: () => Promise<Result>): Promise<Result | null> {
  return database.transaction(async (transaction) => {
    const select = { type: QueryTypes.SELECT, transaction, replacements: { name } } as const;
    const take = "SELECT GET_LOCK(CONCAT(DATABASE(), '.', :name), 0) AS isTaken";
    const [row] = await database.query<{ isTaken: number }>(take, select);
    if (Number(row?.isTaken) !== 1) return null;
    try {
      return await work();
    } finally {
      await database.query("SELECT RELEASE_LOCK(CONCAT(DATABASE(), '.', :name))", select);
    }
  });
}
