import { expect } from 'vitest';
import { problemBody } from '#lib/schemas/problem.ts';
import { ERROR_CATALOGUE, type ErrorCode } from '#server/errors.ts';
import type { ApiAnswer } from './apiClient.ts';

/**
 * The answer is the RFC 9457 body of this code, with the request's id, and tells nothing of the inside.
 *
 * @param fields the fields that it must name, in any order.
 */
export function expectProblem(answer: ApiAnswer, code: ErrorCode, fields?: readonly string[]): void {
  expect(answer.headers.get('content-type')).toBe('application/problem+json');
  const problem = problemBody.parse(answer.body);
  const { status, title } = ERROR_CATALOGUE[code];
  expect(answer.status).toBe(status);
  expect(problem).toMatchObject({ code, status, title });
  expect(problem.requestId).toBe(answer.headers.get('x-request-id'));
  expect(answer.text).not.toMatch(/node_modules|\.ts:|at async|SELECT |sequelize/i);
  if (fields !== undefined) expect(problem.errors?.map(({ field }) => field).sort()).toEqual([...fields].sort());
}
