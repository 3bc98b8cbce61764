import { QueryTypes } from 'sequelize';
import { describe, expect, it } from 'vitest';
import { database } from '#server/database/connection.ts';
import { Build } from '#server/models/Build.ts';

describe('the connection', () => {
  it('refuses a query on a tenant table that names no bench, before it runs', async () => {
    const refusal = 'A statement on a tenant table must name its bench';
    await expect(Build.findAll()).rejects.toThrow(refusal);
    await expect(Build.destroy({ where: { name: 'x' } })).rejects.toThrow(refusal);
    const select = database.query('SELECT 1 FROM recordings', { type: QueryTypes.SELECT });
    await expect(select).rejects.toThrow(refusal);
  });
});
