import { beforeAll, describe, expect, it } from 'vitest';
import { AuditEntry } from '#server/models/AuditEntry.ts';
import { AuthSession } from '#server/models/AuthSession.ts';
import { Account } from '#server/models/Account.ts';
import { createAccount, TEST_PASSWORD, type TestAccount } from '#tests/factories/account.ts';
import { apiClient, baseUrl, jsonHeaders, signInCookie } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';

const SIGN_IN = '/api/v1/sign-in';
const anonymous = apiClient();
let account: TestAccount;

beforeAll(async () => {
  account = await createAccount();
});

describe('POST /api/v1/sign-in', () => {
  it('answers a wrong password, an unknown account and a disabled one with the same 401', async () => {
    const disabled = await createAccount();
    await Account.update({ disabledAt: new Date() }, { where: { id: disabled.id } });
    const attempts = [
      { email: account.email, password: 'not this one, surely' },
      { email: 'nobody@test.example', password: TEST_PASSWORD },
      { email: disabled.email, password: TEST_PASSWORD },
    ];
    const details = new Set<unknown>();
    for (const attempt of attempts) {
      const answer = await anonymous.post(SIGN_IN, attempt);
      expectProblem(answer, 'wrong-credentials');
      expect(answer.headers.getSetCookie()).toEqual([]);
      details.add((answer.body as { detail: string }).detail);
    }
    expect(details.size).toBe(1);
  });

  it('takes as long for an unknown account as for a known one', async () => {
    const medianSeconds = async (emailOf: () => Promise<string>) => {
      const times: number[] = [];
      for (let attempt = 0; attempt < 9; attempt += 1) {
        const email = await emailOf();
        const start = performance.now();
        await anonymous.post(SIGN_IN, { email, password: 'not this one, surely' });
        times.push((performance.now() - start) / 1000);
      }
      return times.sort((a, b) => a - b)[4] ?? 0;
    };
    const known = await medianSeconds(async () => (await createAccount()).email);
    const unknown = await medianSeconds(() => Promise.resolve(`${crypto.randomUUID()}@test.example`));
    // Without the hash of nobody the unknown one takes a tenth; a busy machine moves either by a half.
    expect(unknown / known).toBeGreaterThan(0.4);
    expect(unknown / known).toBeLessThan(2.5);
  });

  it('answers malformed and unknown fields with 422 that names them', async () => {
    expectProblem(await anonymous.post(SIGN_IN, {}), 'invalid-fields', ['email', 'password']);
    const answer = await anonymous.post(SIGN_IN, { email: account.email, password: TEST_PASSWORD, role: 'owner' });
    expectProblem(answer, 'invalid-fields', ['role']);
  });

  it.each([
    ['another type', { 'content-type': 'text/plain' }, '{}', 'unsupported-media-type'],
    ['no type', {}, new Blob(['{}']), 'unsupported-media-type'],
    [
      'a compressed body',
      { 'content-type': 'application/json', 'content-encoding': 'gzip' },
      '{}',
      'unsupported-media-type',
    ],
    ['broken JSON', { 'content-type': 'application/json' }, '{"email":', 'bad-request'],
    ['broken UTF-8', { 'content-type': 'application/json' }, new Uint8Array([0x22, 0xc3, 0x28, 0x22]), 'bad-request'],
    ['3 MB', { 'content-type': 'application/json' }, ' '.repeat(3_000_000), 'too-large'],
  ] as const)('refuses %s', async (_what, headers, body, code) => {
    const answer = await anonymous.send(SIGN_IN, { method: 'POST', headers: { ...headers, origin: baseUrl() }, body });
    expectProblem(answer, code);
  });

  it('refuses a page of another site', async () => {
    const headers = { ...jsonHeaders(), origin: 'https://elsewhere.example' };
    const body = JSON.stringify({ email: account.email, password: TEST_PASSWORD });
    expectProblem(await anonymous.send(SIGN_IN, { method: 'POST', headers, body }), 'cross-site');
  });

  it('signs in with 204 and a cookie that scripts cannot read', async () => {
    const answer = await anonymous.post(SIGN_IN, { email: account.email.toUpperCase(), password: TEST_PASSWORD });
    expect(answer.status).toBe(204);
    const [cookie = ''] = answer.headers.getSetCookie();
    expect(cookie).toMatch(/^ripplebench=[a-z2-7]{40}; /);
    for (const attribute of ['HttpOnly', 'SameSite=Lax', 'Path=/', 'Max-Age=2592000'])
      expect(cookie).toContain(attribute);
    const id = /=([^;]+)/.exec(cookie)?.[1] ?? '';
    const me = await apiClient({ cookie: `ripplebench=${id}` }).get('/api/v1/me');
    expect(me.body).toMatchObject({ account: { email: account.email } });
  });

  it('keeps only a hash of the identifier', async () => {
    const cookie = await signInCookie(account);
    const rows = await AuthSession.findAll({ where: { accountId: account.id } });
    const id = cookie.split('=')[1] ?? '';
    expect(rows.length).toBeGreaterThan(0);
    for (const { idHash } of rows) expect(idHash.toString('latin1')).not.toContain(id.slice(0, 8));
  });

  it('makes a new identifier each time and ends the one that the cookie held', async () => {
    const first = await signInCookie(account);
    const body = { email: account.email, password: TEST_PASSWORD };
    const again = await apiClient({ cookie: first }).post(SIGN_IN, body);
    expect(again.headers.getSetCookie()[0]).not.toContain(first);
    expectProblem(await apiClient({ cookie: first }).get('/api/v1/me'), 'not-signed-in');
  });

  it('slows down after five wrong passwords, even for the right one, and says for how long', async () => {
    const guessed = await createAccount();
    for (let guess = 0; guess < 5; guess += 1) {
      expectProblem(await anonymous.post(SIGN_IN, { email: guessed.email, password: 'guess' }), 'wrong-credentials');
    }
    const answer = await anonymous.post(SIGN_IN, { email: guessed.email, password: TEST_PASSWORD });
    expectProblem(answer, 'too-many-requests');
    expect(answer.headers.get('retry-after')).toBe('1');
    await new Promise((resolve) => setTimeout(resolve, 1100));
    expect(await signInCookie(guessed)).not.toBe('');
  });

  it('writes refusals and successes into the audit log, and no password', async () => {
    const watched = await createAccount();
    await anonymous.post(SIGN_IN, { email: watched.email, password: 'canary-in-a-password' });
    await signInCookie(watched);
    const entries = await AuditEntry.findAll({ where: { actorAccountId: watched.id }, order: [['id', 'ASC']] });
    expect(entries.map(({ action }) => action)).toEqual(['token.created', 'sign-in.refused', 'sign-in.succeeded']);
    expect(JSON.stringify(entries)).not.toContain('canary');
  });
});

describe('POST /api/v1/sign-out', () => {
  it('refuses another site', async () => {
    const headers = { origin: 'https://elsewhere.example' };
    const cookie = await signInCookie(account);
    expectProblem(await apiClient({ cookie }).send('/api/v1/sign-out', { method: 'POST', headers }), 'cross-site');
  });

  it('ends the sign-in on the server, clears the cookie, and may be repeated', async () => {
    const client = apiClient({ cookie: await signInCookie(account) });
    for (let time = 1; time <= 2; time += 1) {
      const answer = await client.send('/api/v1/sign-out', { method: 'POST', headers: { origin: baseUrl() } });
      expect(answer.status).toBe(204);
      expect(answer.headers.getSetCookie()[0]).toMatch(/^ripplebench=deleted; .*Expires=Thu, 01 Jan 1970/);
    }
    expectProblem(await client.get('/api/v1/me'), 'not-signed-in');
  });

  it('leads the form of a page without script on to the sign-in', async () => {
    const client = apiClient({ cookie: await signInCookie(account) });
    const headers = { origin: baseUrl(), accept: 'text/html,*/*' };
    const answer = await client.send('/api/v1/sign-out', { method: 'POST', headers });
    expect([answer.status, answer.headers.get('location')]).toEqual([303, '/sign-in']);
  });
});
