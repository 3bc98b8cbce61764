import { describe, expect, it } from 'vitest';
import { bearerToken } from '#http/bearerToken.ts';

const requestWith = (authorization?: string) =>
  new Request('http://127.0.0.1/', { headers: authorization === undefined ? {} : { authorization } });

describe('bearerToken', () => {
  it.each([
    ['Bearer rb_abc', 'rb_abc'],
    ['bearer   rb_abc', 'rb_abc'],
    ['Bearer', null],
    ['Bearer ', null],
    ['Basic dTpw', null],
    ['Bearer two words', null],
    [undefined, null],
  ])('reads %s as %s', (header, token) => {
    expect(bearerToken(requestWith(header))).toBe(token);
  });
});
