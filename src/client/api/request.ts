import type * as z from 'zod/mini';
import { ApiError, errorFromAnswer, UNEXPECTED_ANSWER_CODE, unreachableError } from './ApiError.ts';

export const API_BASE_PATH = '/api/v1';

export interface RequestOptions<Schema extends z.ZodMiniType> {
  /** Below the base path, with a leading slash. */
  readonly path: string;
  readonly method?: 'GET' | 'POST' | 'PATCH';
  /** Left-out and null values are not sent. */
  readonly search?: Readonly<Record<string, string | number | boolean | null | undefined>>;
  /** Sent as JSON. */
  readonly body?: unknown;
  /** What the answer must look like; the answer is checked, so that a surprise is told instead of drawn. */
  readonly schema: Schema;
  readonly signal?: AbortSignal;
}

/**
 * One call of the JSON API with the cookie of the page.
 *
 * @throws {ApiError} on a refusal, an answer of another shape, or no answer at all
 * @throws {DOMException} AbortError when `signal` ends it
 */
export async function request<Schema extends z.ZodMiniType>(options: RequestOptions<Schema>): Promise<z.infer<Schema>> {
  const response = await send(options);
  const bodyText = await response.text();
  if (!response.ok) throw errorFromAnswer(response.status, bodyText);
  return parseAnswer(options.schema, response.status, bodyText);
}

/** The checked body of a 2xx answer. @throws {ApiError} when it is not JSON of the schema's shape */
export function parseAnswer<Schema extends z.ZodMiniType>(
  schema: Schema,
  status: number,
  bodyText: string,
): z.infer<Schema> {
  try {
    return schema.parse(bodyText === '' ? undefined : JSON.parse(bodyText));
  } catch (cause) {
    throw new ApiError({
      code: UNEXPECTED_ANSWER_CODE,
      status,
      detail: 'Ripplebench answered in a form that this page does not know. Reload the page to get its newest version.',
      cause,
    });
  }
}

async function send(options: RequestOptions<z.ZodMiniType>): Promise<Response> {
  const { path, method = 'GET', search = {}, body, signal } = options;
  const hasBody = body !== undefined;
  try {
    return await fetch(`${API_BASE_PATH}${path}${queryString(search)}`, {
      method,
      credentials: 'same-origin',
      headers: { accept: 'application/json', ...(hasBody && { 'content-type': 'application/json' }) },
      ...(hasBody && { body: JSON.stringify(body) }),
      ...(signal && { signal }),
    });
  } catch (error) {
    if (signal?.aborted) throw error;
    throw unreachableError(error);
  }
}

function queryString(search: NonNullable<RequestOptions<z.ZodMiniType>['search']>): string {
  const given = Object.entries(search).filter(([, value]) => value !== null && value !== undefined);
  if (given.length === 0) return '';
  return `?${new URLSearchParams(given.map(([name, value]) => [name, String(value)])).toString()}`;
}
