import { describe, expect, it } from 'vitest';
import { database } from '#server/database/connection.ts';
import { QueryTypes } from 'sequelize';
import { TENANT_TABLES } from '#server/database/tenancy.ts';
import { Build } from '#server/models/Build.ts';

describe('the connection', () => {
  it('refuses a query on a tenant table that names no bench, before it runs', async () => {
    await expect(Build.findAll()).rejects.toThrow('must name its bench');
    await expect(Build.destroy({ where: { name: 'x' } })).rejects.toThrow('must name its bench');
    await expect(database.query('SELECT 1 FROM recordings', { type: QueryTypes.SELECT })).rejects.toThrow(
      'must name its bench',
    );
  });

  it('knows every table with a bench as one, but those that are about benches themselves', async () => {
    const rows = await database.query<{ tableName: string }>(
      `SELECT table_name AS tableName FROM information_schema.columns
       WHERE table_schema = DATABASE() AND column_name = 'bench_id'`,
      { type: QueryTypes.SELECT },
    );
    // Memberships answer which benches there are; the audit log also tells of what happened in none;
    // turns are the queue's memory of whom it served last.
    const aboutBenches = ['memberships', 'audit_log', 'bench_turns'];
    expect(rows.map(({ tableName }) => tableName).toSorted()).toEqual([...TENANT_TABLES, ...aboutBenches].toSorted());
  });
});
