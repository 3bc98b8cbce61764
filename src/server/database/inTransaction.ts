import { DatabaseError, type Transaction } from 'sequelize';
import { database } from './connection.ts';

const ATTEMPT_MAXIMUM_COUNT = 3;
/** MariaDB: deadlock found; lock wait timeout exceeded. Only a rolled-back whole transaction may be tried again. */
const RETRYABLE_ERROR_NUMBERS: readonly number[] = [1213, 1205];

function isRetryable(error: unknown): boolean {
  if (!(error instanceof DatabaseError)) return false;
  const number = (error.original as { errno?: unknown }).errno;
  return typeof number === 'number' && RETRYABLE_ERROR_NUMBERS.includes(number);
}

/**
 * Runs `work` in one transaction and commits it. After a deadlock or a lock time-out the whole transaction is
 * rolled back and tried again, so `work` must touch nothing outside the database.
 */
export async function inTransaction<Result>(work: (transaction: Transaction) => Promise<Result>): Promise<Result> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await database.transaction(work);
    } catch (error) {
      if (attempt >= ATTEMPT_MAXIMUM_COUNT || !isRetryable(error)) throw error;
    }
  }
}
