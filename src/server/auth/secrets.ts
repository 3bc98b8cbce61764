import { createHash, randomBytes } from 'node:crypto';

const SECRET_BYTES = 32;

/** An unguessable value for a token or a link, in characters that an address may hold. */
export function newSecret(): string {
  return randomBytes(SECRET_BYTES).toString('base64url');
}

/** What the database keeps of a secret. A fast hash is enough for 32 random bytes: there is nothing to guess. */
export function hashOfSecret(secret: string): Buffer {
  return createHash('sha256').update(secret).digest();
}
