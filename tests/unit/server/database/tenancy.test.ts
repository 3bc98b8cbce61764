import { describe, expect, it } from 'vitest';
import { isBenchScoped, refuseUnscopedStatement, TENANT_TABLES } from '#server/database/tenancy.ts';

describe('isBenchScoped', () => {
  it.each(TENANT_TABLES)('wants the bench in every statement on %s', (table) => {
    const statements = [
      `SELECT * FROM \`${table}\` WHERE id = 1`,
      `UPDATE ${table} SET note = 'x' WHERE id = 1`,
      `DELETE FROM ${table} WHERE id = 1`,
      `DELETE FROM ${table}`,
      `INSERT INTO ${table} (id) VALUES (1)`,
      `SELECT * FROM benches JOIN ${table} ON ${table}.bench_id = benches.id`,
    ];
    for (const statement of statements) expect([statement, isBenchScoped(statement)]).toEqual([statement, false]);
    expect(isBenchScoped(`SELECT * FROM ${table} WHERE bench_id = 'a' AND id = 1`)).toBe(true);
    expect(isBenchScoped(`INSERT INTO ${table} (id, bench_id) VALUES (1, 'a')`)).toBe(true);
  });

  it('takes a bench that is only selected or set for none', () => {
    expect(isBenchScoped('SELECT bench_id FROM builds WHERE id = 1')).toBe(false);
    expect(isBenchScoped("UPDATE builds SET bench_id = 'a' WHERE id = 1")).toBe(false);
  });

  it('lets work across benches through when it gives its reason', () => {
    expect(isBenchScoped('/* every bench: looks for expired leases */ SELECT * FROM recordings')).toBe(true);
    expect(isBenchScoped('/* every bench: */ SELECT * FROM recordings')).toBe(false);
    expect(isBenchScoped('SELECT * FROM recordings /* every bench: too late to say so */')).toBe(false);
  });

  it('leaves tables without tenants alone', () => {
    expect(isBenchScoped('SELECT * FROM accounts WHERE id = 1')).toBe(true);
    expect(isBenchScoped('SELECT * FROM auth_sessions WHERE id_hash = 1')).toBe(true);
  });
});

describe('refuseUnscopedStatement', () => {
  it('throws on what Sequelize is about to run, with the statement', () => {
    expect(() => {
      refuseUnscopedStatement('Executing (default): SELECT * FROM builds');
    }).toThrow('A statement on a tenant table must name its bench');
  });
});
