import { beforeAll, describe, expect, it } from 'vitest';
import { Build } from '#server/models/Build.ts';
import { createBenchWithAccounts, type TestBench } from '#tests/factories/account.ts';
import { apiClient, baseUrl, signInCookie } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';

const BUILDS = '/api/v1/builds';
const BODY = JSON.stringify({
  name: 'Forged',
  geometry: { poles: 2, segments: 3, blades: null, teeth: null, magnets: null },
});
const JSON_TYPE = { 'content-type': 'application/json' };

let bench: TestBench;
let cookie: string;

beforeAll(async () => {
  bench = await createBenchWithAccounts();
  cookie = await signInCookie(bench.owner);
});

function post(headers: Record<string, string>, credentials: { cookie?: string; token?: string } = { cookie }) {
  return apiClient(credentials).send(BUILDS, { method: 'POST', headers, body: new Blob([BODY]) });
}

describe('a change with the sign-in cookie', () => {
  it.each([
    ['JSON from another origin', { ...JSON_TYPE, origin: 'https://elsewhere.example' }],
    ['octets from another origin', { 'content-type': 'application/octet-stream', origin: 'https://elsewhere.example' }],
    ['no type from another origin', { origin: 'https://elsewhere.example' }],
    ['a form from another origin', { 'content-type': 'text/plain', origin: 'https://elsewhere.example' }],
    ['the null origin', { ...JSON_TYPE, origin: 'null' }],
    ['another port of this host', { ...JSON_TYPE, origin: 'http://127.0.0.1:1' }],
    ['an origin that begins like this one', { ...JSON_TYPE, origin: `${baseUrl()}.elsewhere.example` }],
    ['neither Origin nor Sec-Fetch-Site', JSON_TYPE],
    ['Sec-Fetch-Site: cross-site', { ...JSON_TYPE, 'sec-fetch-site': 'cross-site' }],
    ['Sec-Fetch-Site: same-site', { ...JSON_TYPE, 'sec-fetch-site': 'same-site' }],
    [
      'its own origin but Sec-Fetch-Site: cross-site',
      { ...JSON_TYPE, origin: baseUrl(), 'sec-fetch-site': 'cross-site' },
    ],
  ])('is refused with %s', async (_what, headers) => {
    expectProblem(await post(headers), 'cross-site');
    expect(await Build.count({ where: { benchId: bench.benchId, name: 'Forged' } })).toBe(0);
  });

  it.each([
    ['its own origin', { ...JSON_TYPE, origin: baseUrl() }],
    ['Sec-Fetch-Site: same-origin', { ...JSON_TYPE, 'sec-fetch-site': 'same-origin' }],
  ])('is taken with %s', async (_what, headers) => {
    expect((await post(headers)).status).toBe(201);
  });

  it('does not concern a token, which no browser sends on its own', async () => {
    expect((await post(JSON_TYPE, { token: bench.owner.token, cookie })).status).toBe(201);
  });
});
