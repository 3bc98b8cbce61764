import { describe, expect, it } from 'vitest';
import { localPath } from '#http/localPath.ts';

describe('localPath', () => {
  it.each([
    ['/', '/'],
    ['/sessions/1?x=supply', '/sessions/1?x=supply'],
    ['/a/../builds', '/builds'],
    ['/sessions#record', '/sessions'],
  ])('keeps %j as %j', (address, path) => {
    expect(localPath(address)).toBe(path);
  });

  it.each([
    null,
    '',
    'sessions',
    'https://elsewhere.example/',
    '//elsewhere.example/',
    '/\\elsewhere.example/',
    '/\t/elsewhere.example/',
    '/a/..//elsewhere.example/',
    '/%2e%2e//elsewhere.example',
    'javascript:alert(1)',
    '/api/v1/sign-out',
    '/\r\nset-cookie: a=b',
  ])('refuses %j', (address) => {
    expect(localPath(address)).toBeNull();
  });
});
