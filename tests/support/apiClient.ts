import { TEST_PASSWORD, type TestAccount } from '#tests/factories/account.ts';

/** Speaks to the built web server that the test run started, over HTTP like everyone else. */

export interface ApiAnswer {
  readonly status: number;
  readonly headers: Headers;
  readonly text: string;
  /** The parsed body; null when it is empty or not JSON. Typed loosely on purpose: tests state what they expect. */
  readonly body: unknown;
}

export interface ApiClient {
  /** Any request; `path` from the root of the site. */
  send(path: string, init?: RequestInit): Promise<ApiAnswer>;
  get(path: string): Promise<ApiAnswer>;
  post(path: string, body: unknown): Promise<ApiAnswer>;
  patch(path: string, body: unknown): Promise<ApiAnswer>;
}

export function baseUrl(): string {
  const url = process.env.RIPPLEBENCH_TEST_URL;
  if (url === undefined) throw new Error('RIPPLEBENCH_TEST_URL is missing: run integration tests with npm test.');
  return url;
}

/** @param credentials a bearer token, the value of a Cookie header, or neither. */
export function apiClient(credentials: { token?: string; cookie?: string } = {}): ApiClient {
  async function send(path: string, init: RequestInit = {}): Promise<ApiAnswer> {
    const headers = new Headers(init.headers);
    if (credentials.token !== undefined) headers.set('authorization', `Bearer ${credentials.token}`);
    if (credentials.cookie !== undefined) headers.set('cookie', credentials.cookie);
    const response = await fetch(baseUrl() + path, { redirect: 'manual', ...init, headers });
    const text = await response.text();
    const isJson = text !== '' && /^application\/(?:problem\+)?json/.test(response.headers.get('content-type') ?? '');
    return { status: response.status, headers: response.headers, text, body: isJson ? JSON.parse(text) : null };
  }

  const sendJson = (method: string, path: string, body: unknown) =>
    send(path, { method, headers: jsonHeaders(), body: JSON.stringify(body) });

  return {
    send,
    get: (path) => send(path),
    post: (path, body) => sendJson('POST', path, body),
    patch: (path, body) => sendJson('PATCH', path, body),
  };
}

/** What a page of the site sends: without the origin, a change with a cookie is refused. */
export function jsonHeaders(): Record<string, string> {
  return { 'content-type': 'application/json', origin: baseUrl() };
}

/** Signs in over HTTP. @returns the Cookie header of the new sign-in. */
export async function signInCookie(account: TestAccount): Promise<string> {
  const answer = await apiClient().post('/api/v1/sign-in', { email: account.email, password: TEST_PASSWORD });
  const [cookie] = answer.headers.getSetCookie();
  if (answer.status !== 204 || cookie === undefined) throw new Error(`sign-in answered ${String(answer.status)}`);
  return cookie.split(';')[0] ?? '';
}
