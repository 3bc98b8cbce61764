import { hash, type Options, verify } from '@node-rs/argon2';
import { createWorkLimit } from './createWorkLimit.ts';

/** Argon2id (the package's default) with the first choice of OWASP's password storage cheat sheet. */
const ARGON2ID: Options = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** Each hash takes 19 MiB and a core for a moment: a class that signs in together waits in line. */
const inTurn = createWorkLimit({ runningMaximum: 2, waitingMaximum: 50 });

/** The hash of a random password that nobody knows; checked when there is no account, so that both take as long. */
const NOBODYS_HASH =
  '$argon2id$v=19$m=19456,t=2,p=1$WmLSKsG9vPz3fkj4QUK76Q$b3sV+ti0FVHmzcWpFxoQcIMWU6oG/+EmLMdzfYxk0Mg';

/** @throws ServerError too-many-requests */
export function passwordHash(password: string): Promise<string> {
  return inTurn(() => hash(normalised(password), ARGON2ID));
}

/**
 * Whether this is the password behind the stored hash; never so when there is none.
 *
 * @throws ServerError too-many-requests
 */
export async function isPasswordOf(storedHash: string | null, password: string): Promise<boolean> {
  const isMatch = await inTurn(() => verify(storedHash ?? NOBODYS_HASH, normalised(password)));
  return isMatch && storedHash !== null;
}

/** Keyboards write "é" as one character or as two; both are the same password. */
function normalised(password: string): string {
  return password.normalize('NFC');
}
