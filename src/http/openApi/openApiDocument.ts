import { uploadFields } from '#lib/schemas/recording.ts';
import { SERIES_NAMES } from '#lib/analysis/series.ts';
import { IDEMPOTENCY_KEY_MAXIMUM_CHARACTERS } from '#lib/schemas/recording.ts';
import { sessionCookieName } from '#server/auth/sessionCookie.ts';
import { POLICY_TABLE } from '#server/policies/policyTable.ts';
import { API_BASE_PATH, type ApiCall, type CallDescription, CALLS } from './calls.ts';
import { componentSchemas, jsonSchema, type JsonSchema, reference } from './components.ts';

type Operation = Readonly<Record<string, unknown>>;

/** OpenAPI 3.1, made from the schemas, the policy table and one line of words a call. */
export function openApiDocument() {
  return {
    openapi: '3.1.0',
    info: {
      title: 'Ripplebench',
      version: '1',
      description: 'Shaft speed of small motors from recordings of their sound. Fields are added, never renamed.',
    },
    servers: [{ url: API_BASE_PATH }],
    paths: paths(),
    components: {
      schemas: componentSchemas(),
      securitySchemes: {
        token: { type: 'http', scheme: 'bearer' },
        signIn: { type: 'apiKey', in: 'cookie', name: sessionCookieName() },
      },
    },
  };
}

function paths(): Record<string, Record<string, Operation>> {
  const byPath: Record<string, Record<string, Operation>> = {};
  for (const [call, description] of Object.entries(CALLS) as [ApiCall, CallDescription][]) {
    const [method = '', route = ''] = call.split(' ');
    const path = route.slice(API_BASE_PATH.length).replaceAll(/\[(\w+)\]/g, '{$1}');
    byPath[path] = { ...byPath[path], [method.toLowerCase()]: operation(call, description) };
  }
  return byPath;
}

function operation(call: ApiCall, { summary, query, body, answers }: CallDescription): Operation {
  const parameters = [...pathParameters(call), ...(query ? queryParameters(jsonSchema(query)) : [])];
  if (body === 'multipart') parameters.push(IDEMPOTENCY_KEY_PARAMETER);
  const isForAccounts = POLICY_TABLE[call].audience === 'account';
  return {
    operationId: operationId(call),
    summary,
    ...(parameters.length > 0 && { parameters }),
    ...(body !== undefined && { requestBody: requestBody(body) }),
    responses: {
      ...Object.fromEntries(Object.entries(answers).map(([status, answer]) => [status, response(answer)])),
      default: {
        description: 'A refusal or failure (RFC 9457)',
        content: { 'application/problem+json': { schema: reference('Problem') } },
      },
    },
    security: isForAccounts ? [{ token: [] }, { signIn: [] }] : [],
  };
}

/** 'PATCH /api/v1/builds/[id]' → 'patchBuildsById'. */
function operationId(call: ApiCall): string {
  const words = call
    .replace(API_BASE_PATH, '')
    .replaceAll(/\[(\w)(\w*)\]/g, (_all, first: string, rest: string) => `By${first.toUpperCase()}${rest}`)
    .split(/[^A-Za-z]+/);
  return words.map((word, index) => (index === 0 ? word.toLowerCase() : capitalised(word))).join('');
}

function capitalised(word: string): string {
  return word.charAt(0).toUpperCase() + word.slice(1);
}

function pathParameters(call: ApiCall): Operation[] {
  return [...call.matchAll(/\[(\w+)\]/g)].map(([, name]) => ({
    name,
    in: 'path',
    required: true,
    schema: name === 'name' ? { enum: SERIES_NAMES } : { type: 'string', format: 'uuid' },
  }));
}

function queryParameters({ properties = {}, required = [] }: JsonSchema): Operation[] {
  return Object.entries(properties as Record<string, JsonSchema>).map(([name, schema]) => ({
    name,
    in: 'query',
    required: (required as string[]).includes(name),
    schema,
  }));
}

const IDEMPOTENCY_KEY_PARAMETER: Operation = {
  name: 'Idempotency-Key',
  in: 'header',
  required: false,
  description: 'The same key with the same bytes is the same recording, however often it is sent.',
  schema: { type: 'string', minLength: 1, maxLength: IDEMPOTENCY_KEY_MAXIMUM_CHARACTERS },
};

function requestBody(body: NonNullable<CallDescription['body']>): Operation {
  const content =
    body === 'multipart'
      ? { 'multipart/form-data': { schema: uploadForm() } }
      : { 'application/json': { schema: reference(body) } };
  return { required: true, content };
}

/** A form carries text: numbers as decimals, lists with commas. */
function uploadForm(): JsonSchema {
  const { properties } = jsonSchema(uploadFields) as { properties: Record<string, JsonSchema> };
  return {
    type: 'object',
    required: ['file'],
    properties: {
      ...properties,
      orders: { type: 'string', description: 'Numbers separated by commas' },
      file: { type: 'string', contentMediaType: 'application/octet-stream' },
    },
  };
}

function response(answer: CallDescription['answers'][number]): Operation {
  if (answer == null) return { description: 'Done' };
  if (typeof answer === 'string') {
    return { description: answer, content: { 'application/json': { schema: reference(answer) } } };
  }
  return { description: answer.description, content: { [answer.contentType]: {} } };
}
