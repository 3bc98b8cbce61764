import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { ROLES } from '#lib/schemas/account.ts';
import type { Actor } from '#server/policies/actor.ts';
import { decideAccess, methodsOf, POLICY_TABLE, type Rule, ruleOf } from '#server/policies/policyTable.ts';
import { JOBS } from '#server/queue/jobs.ts';

const PAGES_FOLDER = new URL('../../../../src/pages', import.meta.url).pathname;
const METHODS = ['GET', 'HEAD', 'POST', 'PUT', 'PATCH', 'DELETE', 'OPTIONS'];
/** Astro shows them when nothing else fits, and the catch-all answers 404 to everyone: they show no record. */
const ERROR_ROUTES = ['/404', '/500', '/api/[...path]'];

/** Every (method, route) that the sources answer, read from them and not from the table. */
function callsOfSources(): string[] {
  return readdirSync(PAGES_FOLDER, { recursive: true, encoding: 'utf8' })
    .filter((path) => /\.(?:ts|astro)$/.test(path))
    .flatMap((path) => {
      const route = `/${path.replace(/\.(?:ts|astro)$/, '').replace(/(?:^|\/)index$/, '')}`;
      if (ERROR_ROUTES.includes(route)) return [];
      const source = readFileSync(join(PAGES_FOLDER, path), 'utf8');
      return methodsIn(source, path.endsWith('.astro')).map((method) => `${method} ${route}`);
    });
}

function methodsIn(source: string, isPage: boolean): string[] {
  if (isPage) return source.includes("Astro.request.method === 'POST'") ? ['GET', 'POST'] : ['GET'];
  return METHODS.filter((method) => new RegExp(`^export (?:const|(?:async )?function) ${method}\\b`, 'm').test(source));
}

function actorWith(role: (typeof ROLES)[number] | null, access: 'read' | 'write' = 'write'): Actor {
  const memberships = role === null ? [] : [{ benchId: 'bench', benchName: 'Bench', role }];
  return { account: { id: 'a', email: 'a@b.example', name: 'A' }, memberships, via: 'token', access };
}

describe('POLICY_TABLE', () => {
  const calls = Object.keys(POLICY_TABLE);

  it('has a rule for every route of the sources, and no rule without one', () => {
    const fromSources = callsOfSources();
    expect(fromSources.length).toBeGreaterThan(30);
    const requests = calls.filter((call) => !call.startsWith('JOB '));
    expect(requests.toSorted()).toEqual(fromSources.toSorted());
  });

  it('has a rule for every job, and no rule without one', () => {
    const jobs = calls.filter((call) => call.startsWith('JOB ')).map((call) => call.slice('JOB '.length));
    expect(jobs.toSorted()).toEqual(Object.keys(JOBS).toSorted());
  });

  it('names the route of its file in every endpoint, so that no rule guards another door', () => {
    for (const call of callsOfSources().filter((line) => line.includes(' /api/'))) {
      const route = call.split(' ')[1] ?? '';
      const files = [`${route}.ts`, `${route}/index.ts`].map((path) => join(PAGES_FOLDER, path));
      const sources = files.map((file) => {
        try {
          return readFileSync(file, 'utf8');
        } catch {
          return '';
        }
      });
      expect(sources.join('')).toContain(`call: '${call}'`);
    }
  });

  it('lets nobody write but through sign-in, sign-out and a one-time link', () => {
    const open = Object.entries(POLICY_TABLE).filter(
      ([, rule]) => rule.audience === 'anyone' && rule.access === 'write',
    );
    expect(open.map(([call]) => call)).toEqual([
      'POST /sign-in',
      'POST /set-password/[token]',
      'POST /api/v1/sign-in',
      'POST /api/v1/sign-out',
    ]);
  });

  it('reads with GET only, and writes with everything else', () => {
    for (const [call, rule] of Object.entries(POLICY_TABLE)) {
      expect([call, rule.access]).toEqual([call, call.startsWith('GET ') ? 'read' : 'write']);
    }
  });
});

describe('ruleOf', () => {
  it('knows no rule for a call outside the table, nor for what every object inherits', () => {
    for (const call of ['DELETE /api/v1/builds', 'constructor', '__proto__', 'GET /api/v1/builds/']) {
      expect(ruleOf(call)).toBeUndefined();
    }
  });
});

describe('methodsOf', () => {
  it('lists the methods of one route', () => {
    expect(methodsOf('/api/v1/builds/[id]')).toEqual(['GET', 'PATCH']);
    expect(methodsOf('/nowhere')).toEqual([]);
  });
});

describe('decideAccess', () => {
  const contribute: Rule = { audience: 'account', access: 'write', ability: 'contribute' };
  const review: Rule = { audience: 'account', access: 'write', ability: 'review' };
  const read: Rule = { audience: 'account', access: 'read' };

  it('never lets a request make a job', () => {
    expect(decideAccess({ audience: 'worker', access: 'write' }, actorWith('owner'))).toBe('forbidden');
  });

  it('sends nobody to sign in, except where anyone may', () => {
    for (const rule of [contribute, review, read]) expect(decideAccess(rule, null)).toBe('not-signed-in');
    for (const audience of ['probe', 'anyone'] as const) {
      expect(decideAccess({ audience, access: 'read' }, null)).toBe('allowed');
    }
  });

  it('decides by role: viewers read, members contribute, leads and owners review', () => {
    const decisions = ROLES.map((role) =>
      [contribute, review, read].map((rule) => decideAccess(rule, actorWith(role))),
    );
    expect(decisions).toEqual([
      ['allowed', 'allowed', 'allowed'],
      ['allowed', 'allowed', 'allowed'],
      ['allowed', 'forbidden', 'allowed'],
      ['forbidden', 'forbidden', 'allowed'],
    ]);
  });

  it('lets a read token of an owner read and nothing else', () => {
    expect([contribute, review, read].map((rule) => decideAccess(rule, actorWith('owner', 'read')))).toEqual([
      'forbidden',
      'forbidden',
      'allowed',
    ]);
  });

  it('lets an account without a bench write nothing', () => {
    expect(decideAccess(contribute, actorWith(null))).toBe('forbidden');
  });
});
