import type { Adapter, DatabaseSession, DatabaseUser } from 'lucia';
import { QueryTypes } from 'sequelize';
import { database } from '../database/connection.ts';
import { hashOfSecret } from './secrets.ts';

/** However busy it is kept, a sign-in ends after this. */
const ABSOLUTE_LIMIT_DAYS = 30;

interface SessionRow {
  readonly accountId: string;
  readonly secondsLeft: number | string;
  readonly email: string;
  readonly name: string;
}

const secondsFromNow = (time: Date): number => (time.getTime() - Date.now()) / 1000;
const timeFromNow = (seconds: number): Date => new Date(Date.now() + seconds * 1000);

/**
 * Lucia's view of auth_sessions. Lucia knows the identifiers of the cookies; the database only ever sees their
 * SHA-256. Lucia judges by the clock of this process; the database keeps the time, so what passes between them is
 * how many seconds are left, and a clock that is set wrong signs nobody out.
 */
export const authSessionAdapter: Adapter = {
  async getSessionAndUser(sessionId): Promise<[DatabaseSession | null, DatabaseUser | null]> {
    const [row] = await database.query<SessionRow>(
      `SELECT s.account_id AS accountId, a.email, a.name,
         TIMESTAMPDIFF(MICROSECOND, UTC_TIMESTAMP(3), s.expires_at) / 1e6 AS secondsLeft
       FROM auth_sessions s JOIN accounts a ON a.id = s.account_id
       WHERE s.id_hash = ? AND a.disabled_at IS NULL`,
      { type: QueryTypes.SELECT, replacements: [hashOfSecret(sessionId)] },
    );
    if (row === undefined) return [null, null];
    const { accountId, email, name } = row;
    const expiresAt = timeFromNow(Number(row.secondsLeft));
    return [
      { id: sessionId, userId: accountId, expiresAt, attributes: {} },
      { id: accountId, attributes: { email, name } },
    ];
  },

  /** Never called: an identifier cannot be told from its hash. */
  getUserSessions: () => Promise.resolve([]),

  async setSession({ id, userId, expiresAt }) {
    await database.query(
      `INSERT INTO auth_sessions (id_hash, account_id, expires_at, created_at)
       VALUES (?, ?, TIMESTAMPADD(SECOND, ?, UTC_TIMESTAMP(3)), UTC_TIMESTAMP(3))`,
      {
        type: QueryTypes.INSERT,
        replacements: [hashOfSecret(id), userId, Math.round(secondsFromNow(expiresAt))],
      },
    );
  },

  async updateSessionExpiration(sessionId, expiresAt) {
    await database.query(
      `UPDATE auth_sessions SET expires_at = LEAST(
         TIMESTAMPADD(SECOND, ?, UTC_TIMESTAMP(3)), TIMESTAMPADD(DAY, ?, created_at))
       WHERE id_hash = ?`,
      {
        type: QueryTypes.UPDATE,
        replacements: [Math.round(secondsFromNow(expiresAt)), ABSOLUTE_LIMIT_DAYS, hashOfSecret(sessionId)],
      },
    );
  },

  async deleteSession(sessionId) {
    const replacements = [hashOfSecret(sessionId)];
    await database.query('DELETE FROM auth_sessions WHERE id_hash = ?', {
      type: QueryTypes.DELETE,
      replacements,
    });
  },

  async deleteUserSessions(userId) {
    const replacements = [userId];
    await database.query('DELETE FROM auth_sessions WHERE account_id = ?', {
      type: QueryTypes.DELETE,
      replacements,
    });
  },

  async deleteExpiredSessions() {
    await database.query('DELETE FROM auth_sessions WHERE expires_at <= UTC_TIMESTAMP(3)', {
      type: QueryTypes.DELETE,
    });
  },
};
