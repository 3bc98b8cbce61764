/**
 * The bench is the tenant boundary. Every statement on a tenant table must choose its bench in a WHERE or write it
 * as a column; one that does not is a programming error and is refused before it reaches the database.
 */
export const TENANT_TABLES = [
  'devices',
  'builds',
  'sessions',
  'recordings',
  'readings',
  'reading_series',
  'reviews',
  'outbox',
] as const;

/**
 * Work that belongs to no single bench (claiming, reconciling, sweeping) says so, with its reason, at the start
 * of its own SQL: `/* every bench: the reconciler looks for expired leases *\/ SELECT …`.
 */
const EVERY_BENCH = /^\/\* every bench: \S.{7,}? \*\//s;
const TENANT_TABLE = new RegExp(`\\b(?:from|join|update|into)\\s+\`?(?:${TENANT_TABLES.join('|')})\`?(?![\\w])`, 'i');
const LOG_PREFIX = /^Execut(?:ing|ed) \([^)]*\): /;

/** @returns whether a statement is free to run: no tenant table, or its bench is named. */
export function isBenchScoped(loggedStatement: string): boolean {
  const statement = loggedStatement.replace(LOG_PREFIX, '').trimStart();
  if (EVERY_BENCH.test(statement) || !TENANT_TABLE.test(statement)) return true;
  if (/^insert\b/i.test(statement)) return /\bbench_id\b/.test(statement);
  const whereAt = statement.search(/\bwhere\b/i);
  return whereAt >= 0 && /\bbench_id\b/.test(statement.slice(whereAt));
}

/** Sequelize calls this with every statement before it runs. */
export function refuseUnscopedStatement(loggedStatement: string): void {
  if (isBenchScoped(loggedStatement)) return;
  throw new Error(`A statement on a tenant table must name its bench: ${loggedStatement.slice(0, 300)}`);
}
