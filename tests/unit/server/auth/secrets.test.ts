import { describe, expect, it } from 'vitest';
import { hashOfSecret, newSecret } from '#server/auth/secrets.ts';

describe('newSecret', () => {
  it('is 32 random bytes in 43 characters that an address may hold', () => {
    const secrets = Array.from({ length: 100 }, newSecret);
    for (const secret of secrets) expect(secret).toMatch(/^[\w-]{43}$/);
    expect(new Set(secrets).size).toBe(100);
  });
});

describe('hashOfSecret', () => {
  it('is SHA-256: "abc" gives the value of FIPS 180-2, appendix B.1', () => {
    expect(hashOfSecret('abc').toString('hex')).toBe(
      'ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad',
    );
  });
});
