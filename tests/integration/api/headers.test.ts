import { once } from 'node:events';
import { type IncomingMessage, request } from 'node:http';
import { describe, expect, it } from 'vitest';
import { createBenchWithAccounts } from '#tests/factories/account.ts';
import { apiClient, baseUrl } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';

const anonymous = apiClient();

/** `fetch` refuses to send it. */
async function statusOfTrace(path: string): Promise<[number | undefined, string | undefined]> {
  const call = request(new URL(path, baseUrl()), { method: 'TRACE' }).end();
  const [answer] = (await once(call, 'response')) as [IncomingMessage];
  answer.resume();
  return [answer.statusCode, answer.headers['content-type']];
}

describe('every answer', () => {
  it.each(['/healthz', '/api/v1/me', '/api/v1/nothing', '/sign-in', '/no-such-page'])(
    'of %s carries the security headers and the id of the request',
    async (path) => {
      const { headers } = await anonymous.get(path);
      expect(headers.get('x-content-type-options')).toBe('nosniff');
      expect(headers.get('referrer-policy')).toBe('same-origin');
      expect(headers.get('content-security-policy')).toContain("frame-ancestors 'none'");
      expect(headers.get('cache-control')).toContain('no-store');
      expect(headers.get('x-request-id')).toMatch(/^[0-9a-f-]{36}$/);
    },
  );

  it('of a page allows scripts and styles by their hash only', async () => {
    const policy = (await anonymous.get('/sign-in')).headers.get('content-security-policy') ?? '';
    const directives = new Map(
      policy.split(';').map((directive) => [directive.trim().split(' ')[0], directive.trim()]),
    );
    expect(directives.get('script-src')).toMatch(/^script-src 'self' 'sha256-/);
    expect(directives.get('script-src')).not.toContain('unsafe');
    expect(directives.get('style-src')).not.toContain('unsafe');
    expect(directives.get('default-src')).toBe("default-src 'self'");
    expect(directives.get('object-src')).toBe("object-src 'none'");
    expect(directives.get('base-uri')).toBe("base-uri 'self'");
  });
});

describe('an address or method that does not exist', () => {
  it('answers 404 below /api with a problem body, for every method', async () => {
    for (const method of ['GET', 'POST', 'DELETE']) {
      expectProblem(await anonymous.send('/api/v1/nothing', { method }), 'not-found');
    }
  });

  it('answers 405 with the methods that there are', async () => {
    const answer = await anonymous.send('/api/v1/me', { method: 'DELETE' });
    expectProblem(answer, 'method-not-allowed');
    expect(answer.headers.get('allow')).toBe('GET');
    expectProblem(await anonymous.send('/builds', { method: 'POST' }), 'method-not-allowed');
  });

  it('answers 405 to TRACE, which no Request can carry, also where there is nothing', async () => {
    for (const path of ['/', '/api/v1/recordings', '/api/v1/nothing']) {
      expect(await statusOfTrace(path)).toEqual([405, 'application/problem+json']);
    }
  });

  it('answers HEAD like GET, without a body', async () => {
    const answer = await anonymous.send('/healthz', { method: 'HEAD' });
    expect([answer.status, answer.text]).toEqual([200, '']);
  });

  it('answers 404 for a page, and for a page about a record that is not there', async () => {
    const { owner } = await createBenchWithAccounts();
    for (const path of ['/no-such-page', `/builds/${crypto.randomUUID()}`, '/recordings/1', '/set-password/mistyped']) {
      const answer = await apiClient(owner).get(path);
      expect([path, answer.status, answer.headers.get('content-type')]).toEqual([path, 404, 'text/html']);
      expect(answer.headers.get('content-security-policy')).toContain("style-src 'self'");
      expect(answer.text).toContain(answer.headers.get('x-request-id') ?? 'no id');
    }
  });

  it('refuses a form of another site with a page', async () => {
    const headers = { origin: 'https://elsewhere.example' };
    const body = new URLSearchParams({ email: 'a@b.example', password: 'x' });
    const answer = await anonymous.send('/sign-in', { method: 'POST', headers, body });
    expect([answer.status, answer.headers.get('content-type')]).toEqual([403, 'text/html']);
    expect(answer.text).toContain('The request came from another site');
  });
});

describe('a page for people with an account', () => {
  it('leads nobody to the sign-in, with the way back', async () => {
    const answer = await anonymous.get('/builds?bench=1');
    expect([answer.status, answer.headers.get('location')]).toEqual([303, '/sign-in?next=%2Fbuilds%3Fbench%3D1']);
  });
});
