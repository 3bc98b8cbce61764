import { execa } from 'execa';
import { join, resolve } from 'node:path';
import { describe, expect, it } from 'vitest';
import { Account } from '#server/models/Account.ts';
import { ApiToken } from '#server/models/ApiToken.ts';
import { SingleUseLink } from '#server/models/SingleUseLink.ts';
import { apiClient, baseUrl } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';

const newEmail = () => `Maker.${crypto.randomUUID()}@Test.example`;
const PASSWORD = 'four brass gears turning';

/** Runs a built program as `npm run` does. */
async function run(name: 'token' | 'account', ...programArguments: string[]) {
  const bundle = join(process.env.RIPPLEBENCH_TEST_BUILD ?? '', `scripts/${name}.mjs`);
  const invoke = resolve('scripts/setup/invoke.mjs');
  const result = await execa('node', [invoke, bundle, ...programArguments], { reject: false });
  return { status: result.exitCode, out: result.stdout, errorText: result.stderr };
}

async function postPassword(link: string, password: string) {
  const headers = { 'content-type': 'application/x-www-form-urlencoded', origin: baseUrl() };
  const body = new URLSearchParams({ password });
  return apiClient().send(new URL(link).pathname, { method: 'POST', headers, body });
}

describe('npm run account', () => {
  it.each([[[]], [['--email', 'a@b.example']], [['--email', 'not an address', '--bench', 'B']], [['--color']]])(
    'ends with 2 and its usage for %j',
    async (programArguments) => {
      const result = await run('account', ...programArguments);
      expect([result.status, result.out]).toEqual([2, '']);
      expect(result.errorText).toContain('Usage: npm run --silent account -- --email E --bench NAME');
    },
  );

  it('prints a link that sets the first password of an owner, once', async () => {
    const email = newEmail();
    const { status, out: link } = await run('account', '--email', email, '--bench', 'The attic');
    expect(status).toBe(0);
    expect(link).toMatch(/^http:\/\/\S+\/set-password\/[\w-]{43}$/);

    expect((await postPassword(link, 'too short')).status).toBe(422);
    const set = await postPassword(link, PASSWORD);
    expect(set.status).toBe(303);
    expect((await postPassword(link, PASSWORD)).status).toBe(404);

    const signIn = await apiClient().post('/api/v1/sign-in', { email, password: PASSWORD });
    expect(signIn.status).toBe(204);
    const cookie = signIn.headers.getSetCookie()[0]?.split(';')[0] ?? '';
    const me = await apiClient({ cookie }).get('/api/v1/me');
    expect(me.body).toMatchObject({
      account: { email: email.toLowerCase() },
      benches: [{ name: 'The attic', role: 'owner' }],
    });
  });

  it('gives an existing account another bench, a new link, and an end to the old one', async () => {
    const email = newEmail();
    const first = await run('account', '--email', email, '--bench', 'One');
    const second = await run('account', '--email', email.toLowerCase(), '--bench', 'Two');
    expect(await Account.count({ where: { email: email.toLowerCase() } })).toBe(1);
    expect((await postPassword(first.out, PASSWORD)).status).toBe(404);
    expect((await postPassword(second.out, PASSWORD)).status).toBe(303);
  });

  it('makes links that end after 30 minutes, and keeps only their hash', async () => {
    const { out: link } = await run('account', '--email', newEmail(), '--bench', 'One');
    const token = link.split('/').at(-1) ?? '';
    const [row] = await SingleUseLink.findAll({ order: [['createdAt', 'DESC']], limit: 1 });
    expect(row?.tokenHash.toString('base64url')).not.toBe(token);
    expect(((row?.expiresAt.getTime() ?? 0) - (row?.createdAt.getTime() ?? 0)) / 60_000).toBeCloseTo(30, 3);
    await SingleUseLink.update({ expiresAt: new Date(Date.now() - 1000) }, { where: { id: row?.id ?? '' } });
    const answers = [
      link,
      link.replace(/.$/, (last) => (last === 'A' ? 'B' : 'A')),
      link.toUpperCase().replace(/^.*\//, `${baseUrl()}/set-password/`),
    ];
    for (const address of answers) expect((await apiClient().get(new URL(address).pathname)).status).toBe(404);
  });
});

describe('npm run token', () => {
  it.each([
    [[]],
    [['--email', 'a@b.example']],
    [['--name', 'rig']],
    [['--email', 'a@b.example', '--name', 'x', 'extra']],
  ])('ends with 2 and its usage for %j', async (programArguments) => {
    const result = await run('token', ...programArguments);
    expect([result.status, result.out]).toEqual([2, '']);
    expect(result.errorText).toContain('Usage: npm run --silent token -- --email E --name N');
  });

  it('ends with 1 for an account that does not exist', async () => {
    const result = await run('token', '--email', newEmail(), '--name', 'rig');
    expect([result.status, result.out]).toEqual([1, '']);
    expect(result.errorText).toContain('There is no account');
  });

  it('prints a token that works and nothing else, and keeps only its hash', async () => {
    const email = newEmail();
    await run('account', '--email', email, '--bench', 'Rigs');
    const { status, out: token } = await run('token', '--email', email, '--name', 'rig 1');
    expect([status, token]).toEqual([0, expect.stringMatching(/^rb_[\w-]{43}$/)]);
    expect((await apiClient({ token }).get('/api/v1/me')).body).toMatchObject({ benches: [{ name: 'Rigs' }] });
    const account = await Account.loadByEmail(email);
    const rows = await ApiToken.findAll({ where: { accountId: account?.id ?? '' } });
    expect(rows.map(({ name, access }) => [name, access])).toEqual([['rig 1', 'write']]);
    expect(JSON.stringify(rows)).not.toContain(token);
  });

  it('prints one that only reads with --read', async () => {
    const email = newEmail();
    await run('account', '--email', email, '--bench', 'Rigs');
    const { out: token } = await run('token', '--email', email, '--name', 'wall', '--read');
    const client = apiClient({ token });
    expect((await client.get('/api/v1/builds')).status).toBe(200);
    expectProblem(await client.post('/api/v1/sessions', { title: 'Monday', purpose: 'class' }), 'forbidden');
  });
});
