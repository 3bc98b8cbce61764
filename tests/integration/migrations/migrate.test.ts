import { readdirSync } from 'node:fs';
import { QueryTypes } from 'sequelize';
import { afterAll, describe, expect, it, vi } from 'vitest';
import { database } from '#server/database/connection.ts';
import { migrate, MIGRATIONS } from '#server/database/migrate.ts';
import { TENANT_TABLES } from '#server/database/tenancy.ts';
import '#server/models/ApiToken.ts';
import '#server/models/AuditEntry.ts';
import '#server/models/AuthSession.ts';
import '#server/models/Device.ts';
import '#server/models/Membership.ts';
import '#server/models/OutboxEvent.ts';
import '#server/models/ReadingSeries.ts';
import '#server/models/Recording.ts';
import '#server/models/Review.ts';
import '#server/models/SingleUseLink.ts';

const MIGRATIONS_FOLDER = new URL('../../../src/server/database/migrations/', import.meta.url);

const FIRST_READING_LIMIT = { timeout: 30_000, interval: 100 };

async function columnsByTable(): Promise<Map<string, string[]>> {
  const rows = await database.query<{ tableName: string; columnName: string }>(
    `SELECT table_name AS tableName, column_name AS columnName FROM information_schema.columns
     WHERE table_schema = DATABASE()`,
    { type: QueryTypes.SELECT },
  );
  const columns = new Map<string, string[]>();
  for (const { tableName, columnName } of rows) {
    columns.set(tableName, [...(columns.get(tableName) ?? []), columnName].sort());
  }
  return columns;
}

describe('migrate', () => {
  afterAll(() => database.close());

  it('lists every file of the folder, oldest first', () => {
    const files = readdirSync(MIGRATIONS_FOLDER).map((file) => file.replace(/\.ts$/, ''));
    expect(MIGRATIONS.map(({ name }) => name)).toEqual(files.sort());
  });

  it('runs nothing on a schema that is at the head', async () => {
    expect(await migrate()).toEqual([]);
  });

  it('can be resumed: every step may run again', async () => {
    for (const { steps } of MIGRATIONS) for (const step of steps) await database.query(step);
    expect(await migrate()).toEqual([]);
  });

  it('lets two processes migrate at once', async () => {
    expect(await Promise.all([migrate(), migrate()])).toEqual([[], []]);
  });

  it('gives the tables exactly the columns of the models', async () => {
    const columns = await columnsByTable();
    for (const model of Object.values(database.models)) {
      const expected = Object.values(model.getAttributes()).map(({ field }) => field);
      expect(columns.get(model.getTableName() as string), model.name).toEqual(expected.sort());
    }
  });

  it('puts the bench on every tenant row', async () => {
    const columns = await columnsByTable();
    for (const table of TENANT_TABLES) expect(columns.get(table), table).toContain('bench_id');
  });

  it('gives every table with a bench a place among the tenant tables or a reason not to be one', async () => {
    // A membership is found by its account; the audit log also holds what happened outside benches; turns are the
    // worker's own, taken across benches.
    const others = ['memberships', 'audit_log', 'bench_turns'];
    const withBench = [...(await columnsByTable())]
      .filter(([, names]) => names.includes('bench_id'))
      .map(([name]) => name);
    expect(withBench.sort()).toEqual([...TENANT_TABLES, ...others].sort());
  });

  it('refuses to change a reading, even by hand', async () => {
    // The demo's recordings are being measured while the tests run.
    await vi.waitFor(async () => {
      const readings = await database.query("SELECT id FROM readings WHERE bench_id <> '' LIMIT 1", {
        type: QueryTypes.SELECT,
      });
      expect(readings).toHaveLength(1);
    }, FIRST_READING_LIMIT);
    await expect(
      database.query("UPDATE readings SET confidence = 1 WHERE bench_id <> ''", { type: QueryTypes.UPDATE }),
    ).rejects.toThrow(/immutable/);
  });
});
