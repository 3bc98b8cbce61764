import { beforeAll, describe, expect, it } from 'vitest';
import { POLICY_TABLE } from '#server/policies/policyTable.ts';
import { createBenchWithAccounts } from '#tests/factories/account.ts';
import { apiClient } from '#tests/support/apiClient.ts';
import { expectProblem } from '#tests/support/expectProblem.ts';

interface Operation {
  readonly operationId: string;
  readonly parameters?: { name: string; in: string; required: boolean }[];
  readonly responses: Record<string, { content?: Record<string, { schema?: { $ref: string } }> }>;
  readonly security: unknown[];
}

interface Document {
  readonly openapi: string;
  readonly servers: { url: string }[];
  readonly paths: Record<string, Record<string, Operation>>;
  readonly components: { schemas: Record<string, { properties?: object; required?: string[] }> };
}

let document: Document;
let text: string;
let operations: [string, Operation][];

beforeAll(async () => {
  const answer = await apiClient().get('/api/v1/openapi.json');
  document = answer.body as Document;
  text = answer.text;
  operations = Object.entries(document.paths).flatMap(([path, methods]) =>
    Object.entries(methods).map(([method, operation]): [string, Operation] => [`${method} ${path}`, operation]),
  );
});

describe('GET /api/v1/openapi.json', () => {
  it('refuses parameters that it does not know', async () => {
    expectProblem(await apiClient().get('/api/v1/openapi.json?v=2'), 'invalid-fields', ['v']);
  });

  it('is OpenAPI 3.1 and lists every call of the API, and no other', () => {
    expect([document.openapi, document.servers]).toEqual(['3.1.0', [{ url: '/api/v1' }]]);
    const calls = operations.map(([key]) => {
      const [method = '', path = ''] = key.split(' ');
      return `${method.toUpperCase()} /api/v1${path.replaceAll(/\{(\w+)\}/g, '[$1]')}`;
    });
    expect(calls.toSorted()).toEqual(
      Object.keys(POLICY_TABLE)
        .filter((call) => call.includes(' /api/'))
        .toSorted(),
    );
  });

  it('resolves every reference', () => {
    const references = [...text.matchAll(/"\$ref":"([^"]+)"/g)].map(([, target]) => target ?? '');
    expect(references.length).toBeGreaterThan(40);
    for (const reference of references) {
      expect(reference).toMatch(/^#\/components\/schemas\/\w+$/);
      expect(document.components.schemas).toHaveProperty(reference.split('/').at(-1) ?? '');
    }
  });

  it('names every operation once, declares the parameters of its path, and tells of problems', () => {
    const ids = operations.map(([, { operationId }]) => operationId);
    expect(new Set(ids).size).toBe(ids.length);
    for (const [key, { parameters = [], responses }] of operations) {
      const inPath = [...key.matchAll(/\{(\w+)\}/g)].map(([, name]) => name);
      expect(parameters.filter((parameter) => parameter.in === 'path').map(({ name }) => name)).toEqual(inPath);
      expect(Object.keys(responses).length).toBeGreaterThan(1);
      expect(responses.default?.content).toEqual({
        'application/problem+json': { schema: { $ref: '#/components/schemas/Problem' } },
      });
    }
  });

  it('asks for an account exactly where the policy does', () => {
    const open = operations.filter(([, { security }]) => security.length === 0).map(([key]) => key);
    expect(open).toEqual(['get /openapi.json', 'post /sign-in', 'post /sign-out']);
  });

  it('describes what is really answered, field by field', async () => {
    const { owner } = await createBenchWithAccounts();
    const geometry = { poles: 2, segments: 3, blades: null, teeth: null, magnets: null };
    const build = await apiClient(owner).post('/api/v1/builds', { name: 'Red can', geometry });
    const session = await apiClient(owner).post('/api/v1/sessions', { title: 'Monday', purpose: 'speed-check' });
    const problem = await apiClient(owner).post('/api/v1/builds', {});
    const answers = { Build: build.body, Session: session.body, Problem: problem.body };
    for (const [name, body] of Object.entries(answers)) {
      const { properties = {}, required = [] } = document.components.schemas[name] ?? {};
      expect(Object.keys(properties)).toEqual(expect.arrayContaining(Object.keys(body as object)));
      expect(Object.keys(body as object)).toEqual(expect.arrayContaining(required));
    }
  });
});
