import { describe, expect, it } from 'vitest';
import { ApiToken } from '#server/models/ApiToken.ts';
import { Account } from '#server/models/Account.ts';
import { AuthSession } from '#server/models/AuthSession.ts';
import { Membership } from '#server/models/Membership.ts';
import { createAccount, createBenchWithAccounts } from '#tests/factories/account.ts';
import { apiClient, signInCookie } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';

const ME = '/api/v1/me';

describe('GET /api/v1/me', () => {
  it('refuses nobody with 401 and says how to sign in', async () => {
    const answer = await apiClient().get(ME);
    expectProblem(answer, 'not-signed-in');
    expect(answer.headers.get('www-authenticate')).toBe('Bearer realm="ripplebench"');
  });

  it('refuses a token that is invented, changed by one character, expired, revoked, or of a disabled account', async () => {
    const [expired, revoked, disabled, sound] = await Promise.all([1, 2, 3, 4].map(() => createAccount()));
    if (!expired || !revoked || !disabled || !sound) throw new Error('four accounts were asked for');
    await ApiToken.update({ expiresAt: new Date(Date.now() - 1000) }, { where: { accountId: expired.id } });
    await ApiToken.update({ revokedAt: new Date() }, { where: { accountId: revoked.id } });
    await Account.update({ disabledAt: new Date() }, { where: { id: disabled.id } });
    const changed = sound.token.replace(/.$/, (last) => (last === 'A' ? 'B' : 'A'));
    const caseFlipped = sound.token.toUpperCase();
    const tokens = ['rb_invented', changed, caseFlipped, expired.token, revoked.token, disabled.token, ''];
    for (const token of tokens) expectProblem(await apiClient({ token }).get(ME), 'not-signed-in');
  });

  it('judges a token alone, whatever the cookie says', async () => {
    const account = await createAccount();
    const cookie = await signInCookie(account);
    expectProblem(await apiClient({ cookie, token: 'rb_invented' }).get(ME), 'not-signed-in');
  });

  it('forgets a sign-in that has been idle for 12 hours, and prolongs one in use', async () => {
    const account = await createAccount();
    const client = apiClient({ cookie: await signInCookie(account) });
    const where = { accountId: account.id };
    const inSeconds = (seconds: number) => new Date(Date.now() + seconds * 1000);

    await AuthSession.update({ expiresAt: inSeconds(60) }, { where });
    expect((await client.get(ME)).status).toBe(200);
    const prolonged = await AuthSession.findOne({ where, rejectOnEmpty: true });
    // 12 h from now, by the clock of the database on the same machine.
    expect(prolonged.expiresAt.getTime() / 1000).toBeCloseTo(inSeconds(12 * 3600).getTime() / 1000, -1);

    await AuthSession.update({ expiresAt: inSeconds(-1) }, { where });
    expectProblem(await client.get(ME), 'not-signed-in');
  });

  it('ends a sign-in after 30 days however busy it was', async () => {
    const account = await createAccount();
    const client = apiClient({ cookie: await signInCookie(account) });
    const where = { accountId: account.id };
    const thirtyDaysAgo = new Date(Date.now() - 30 * 24 * 3600 * 1000 + 60_000);
    await AuthSession.update({ createdAt: thirtyDaysAgo, expiresAt: new Date(Date.now() + 30_000) }, { where });
    expect((await client.get(ME)).status).toBe(200);
    const { expiresAt } = await AuthSession.findOne({ where, rejectOnEmpty: true });
    expect(expiresAt.getTime() - Date.now()).toBeLessThanOrEqual(60_000);
  });

  it('loses a bench with the membership, at once', async () => {
    const bench = await createBenchWithAccounts();
    const client = apiClient(bench.member);
    expect((await client.get(ME)).body).toMatchObject({ benches: [{ id: bench.benchId, role: 'member' }] });
    await Membership.destroy({ where: { accountId: bench.member.id } });
    expect((await client.get(ME)).body).toMatchObject({ benches: [] });
  });

  it('tells account, benches and roles, and nothing else', async () => {
    const bench = await createBenchWithAccounts('The club');
    const { lead } = bench;
    expect((await apiClient(lead).get(ME)).body).toEqual({
      account: { id: lead.id, email: lead.email, name: lead.name },
      benches: [{ id: bench.benchId, name: 'The club', role: 'lead' }],
    });
  });
});
