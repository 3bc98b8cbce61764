import { ConnectionAcquireTimeoutError, ConnectionRefusedError, DatabaseError, UniqueConstraintError } from 'sequelize';
import { describe, expect, it } from 'vitest';
import { asServerError, problemOf } from '#http/errorResponse.ts';
import { invalidFields, ServerError } from '#server/errors.ts';

const REQUEST_ID = '018f0000-0000-7000-8000-000000000000';

/** An error as the database driver throws it. */
function databaseError(fields: { errno: number; sqlState: string }): DatabaseError {
  return new DatabaseError(Object.assign(new Error('SELECT secret FROM accounts'), fields, { sql: 'SELECT secret' }));
}

describe('problemOf', () => {
  it('tells a wrong field in the members of RFC 9457 and our own', () => {
    const { problem, retryAfterSeconds } = problemOf(
      invalidFields([{ field: 'name', message: 'Must not be empty.' }]),
      REQUEST_ID,
    );
    expect(problem).toEqual({
      type: 'urn:ripplebench:problem:invalid-fields',
      title: 'Some fields are not valid',
      status: 422,
      code: 'invalid-fields',
      detail: 'name: Must not be empty.',
      requestId: REQUEST_ID,
      errors: [{ field: 'name', message: 'Must not be empty.' }],
    });
    expect(retryAfterSeconds).toBeNull();
  });

  it('tells nothing of an unexpected error but the id of the request', () => {
    const error = new Error('cannot read /srv/secret/path');
    const { problem } = problemOf(error, REQUEST_ID);
    expect(problem).toMatchObject({ status: 500, code: 'internal', requestId: REQUEST_ID });
    expect(JSON.stringify(problem)).not.toMatch(/secret|cannot read|\.ts/);
  });

  it.each<[string, Error]>([
    ['a full pool', new ConnectionAcquireTimeoutError(new Error('timeout'))],
    ['a refused connection', new ConnectionRefusedError(new Error('ECONNREFUSED'))],
    ['a connection lost in the middle', databaseError({ errno: 45_009, sqlState: '08S01' })],
    ['a lock that was not given', databaseError({ errno: 1205, sqlState: 'HY000' })],
    ['a deadlock that lasted', databaseError({ errno: 1213, sqlState: '40001' })],
    ['a statement over its time', databaseError({ errno: 1969, sqlState: '70100' })],
  ])('answers 503 with a time to %s', (_what, error) => {
    const { problem, retryAfterSeconds } = problemOf(error, REQUEST_ID);
    expect(problem).toMatchObject({ status: 503, code: 'database-unavailable' });
    expect(JSON.stringify(problem)).not.toContain('SELECT');
    expect(retryAfterSeconds).toBe(5);
  });

  it.each<[string, Error]>([
    ['a syntax error', databaseError({ errno: 1064, sqlState: '42000' })],
    ['a row that is there already', new UniqueConstraintError({})],
  ])('takes %s for a defect of ours', (_what, error) => {
    expect(problemOf(error, REQUEST_ID).problem.code).toBe('internal');
  });

  it.each(['file-missing', 'worker-lost'] as const)('answers 503 to %s, without the hope of a retry', (code) => {
    const { problem, retryAfterSeconds } = problemOf(new ServerError({ code, detail: 'Gone.' }), REQUEST_ID);
    expect(problem).toMatchObject({ status: 503, code });
    expect(retryAfterSeconds).toBeNull();
  });

  it('hands the time to wait on', () => {
    const error = new ServerError({ code: 'too-many-requests', detail: 'Later.', retryAfterSeconds: 1.2 });
    expect(problemOf(error, REQUEST_ID).retryAfterSeconds).toBe(1.2);
  });
});

describe('asServerError', () => {
  it('keeps the cause for the log', () => {
    const cause = new Error('why');
    expect(asServerError(cause).cause).toBe(cause);
  });
});
