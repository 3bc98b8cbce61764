import { BaseError, ConnectionError, DatabaseError, TimeoutError } from 'sequelize';
import type { ProblemBody } from '#lib/schemas/problem.ts';
import { ERROR_CATALOGUE, ServerError } from '#server/errors.ts';
import { logger } from '#server/logger.ts';

const RETRY_AFTER_SECONDS = 5;
/** SQLSTATE class 08: the connection failed. MariaDB 1205: lock wait; 1213: deadlock; 1969: statement time limit. */
const CONNECTION_SQLSTATE_CLASS = '08';
const BUSY_ERROR_NUMBERS: readonly unknown[] = [1205, 1213, 1969];

/** What the client is told about an error. Nothing of an unexpected one leaves the server but the request's id. */
export function problemOf(
  error: unknown,
  requestId: string,
): { problem: ProblemBody; retryAfterSeconds: number | null } {
  const expected = asServerError(error);
  const entry = ERROR_CATALOGUE[expected.code];
  const { status, title } = entry;
  const isBackSoon = status === 503 && 'isRetryable' in entry;
  return {
    problem: {
      type: `urn:ripplebench:problem:${expected.code}`,
      title,
      status,
      code: expected.code,
      detail: expected.detail,
      requestId,
      ...(expected.fieldErrors.length > 0 && {
        errors: [...expected.fieldErrors],
      }),
    },
    retryAfterSeconds: expected.retryAfterSeconds ?? (isBackSoon ? RETRY_AFTER_SECONDS : null),
  };
}

/** The RFC 9457 answer to an error, which is logged when an operator should hear of it. */
export function errorResponse(error: unknown, requestId: string): Response {
  reportError(error, requestId);
  const { problem, retryAfterSeconds } = problemOf(error, requestId);
  const headers = new Headers({ 'content-type': 'application/problem+json' });
  if (retryAfterSeconds !== null) headers.set('retry-after', String(Math.ceil(retryAfterSeconds)));
  if (problem.code === 'not-signed-in') headers.set('www-authenticate', 'Bearer realm="ripplebench"');
  return new Response(JSON.stringify(problem), {
    status: problem.status,
    headers,
  });
}

export function reportError(error: unknown, requestId: string): void {
  const { code } = asServerError(error);
  if ('isReported' in ERROR_CATALOGUE[code]) logger().error({ err: error, code, requestId }, 'request failed');
}

/** The expected error behind whatever was thrown: lost connections and full pools mean that the database is away. */
export function asServerError(error: unknown): ServerError {
  if (error instanceof ServerError) return error;
  if (error instanceof BaseError && isDatabaseAway(error)) {
    return new ServerError({
      code: 'database-unavailable',
      detail: 'The database does not answer at the moment. Nothing was changed; try again in a few seconds.',
      cause: error,
    });
  }
  return new ServerError({
    code: 'internal',
    detail: 'That should not have happened. Try again; if it stays, tell the operator the request id.',
    cause: error,
  });
}

function isDatabaseAway(error: BaseError): boolean {
  if (error instanceof ConnectionError || error instanceof TimeoutError) return true;
  if (!(error instanceof DatabaseError)) return false;
  const { errno, sqlState } = error.original as {
    errno?: unknown;
    sqlState?: unknown;
  };
  return (
    BUSY_ERROR_NUMBERS.includes(errno) ||
    (typeof sqlState === 'string' && sqlState.startsWith(CONNECTION_SQLSTATE_CLASS))
  );
}
