import { PASSWORD_MAXIMUM_CHARACTERS, PASSWORD_MINIMUM_CHARACTERS } from '#lib/schemas/account.ts';
import { invalidFields } from '../errors.ts';

/** The stems that fill the lists of leaked passwords; any of them padded with digits or signs is as easy to guess. */
const COMMON_STEMS: readonly string[] = [
  'password',
  'passwort',
  'passphrase',
  'qwerty',
  'qwertyuiop',
  'asdfghjkl',
  'zxcvbnm',
  'azerty',
  'letmein',
  'welcome',
  'iloveyou',
  'sunshine',
  'princess',
  'football',
  'baseball',
  'superman',
  'batman',
  'dragon',
  'monkey',
  'shadow',
  'master',
  'trustno',
  'michael',
  'charlie',
  'computer',
  'internet',
  'starwars',
  'administrator',
  'admin',
  'changeme',
  'secret',
  'default',
  'motor',
  'ripplebench',
  'recording',
];

const KEYBOARD_RUNS: readonly string[] = [
  '0123456789',
  'abcdefghijklmnopqrstuvwxyz',
  'qwertyuiop',
  'asdfghjkl',
  'zxcvbnm',
];
/** What is left of a password once its known part is taken away must still be worth guessing. */
const OWN_PART_MINIMUM_CHARACTERS = 6;
const DISTINCT_MINIMUM_COUNT = 5;
const RUN_MINIMUM_CHARACTERS = 4;
const WORD_MINIMUM_CHARACTERS = 4;

/** @throws ServerError invalid-fields (password) with the rule that the password breaks. */
export function refuseWeakPassword(password: string, account: { readonly email: string; readonly name: string }): void {
  const message = weaknessOf(password, account);
  if (message !== null) throw invalidFields([{ field: 'password', message }]);
}

function weaknessOf(password: string, account: { email: string; name: string }): string | null {
  if (password.length < PASSWORD_MINIMUM_CHARACTERS) {
    return `Must have at least ${String(PASSWORD_MINIMUM_CHARACTERS)} characters. Several words in a row are easy to keep.`;
  }
  if (password.length > PASSWORD_MAXIMUM_CHARACTERS) {
    return `Must have at most ${String(PASSWORD_MAXIMUM_CHARACTERS)} characters.`;
  }
  const letters = password.toLowerCase();
  if (new Set(letters).size < DISTINCT_MINIMUM_COUNT) return 'Repeats too few characters. Choose something longer.';
  const ownWords = [...account.email.toLowerCase().split(/[@.]/), ...account.name.toLowerCase().split(/\s+/)];
  if (isMostlyOf(letters, ownWords)) return 'Is mostly your name or address. Choose something that is not about you.';
  if (isMostlyOf(letters, COMMON_STEMS) || withoutPlainRuns(letters).length < OWN_PART_MINIMUM_CHARACTERS) {
    return 'Is one of the most common passwords. Choose something of your own.';
  }
  return null;
}

/** Whether little is left once these words, plain runs, and ASCII digits and signs are taken away. */
function isMostlyOf(letters: string, words: readonly string[]): boolean {
  const found = words.filter((word) => word.length >= WORD_MINIMUM_CHARACTERS && letters.includes(word));
  if (found.length === 0) return false;
  const rest = found.reduce((left, word) => left.replaceAll(word, ''), letters);
  return withoutPlainRuns(rest).replaceAll(/[ -@[-`{-~]/g, '').length < OWN_PART_MINIMUM_CHARACTERS;
}

/** The password without 1234, abcd, qwer and the like, forwards and backwards. */
function withoutPlainRuns(letters: string): string {
  const runs = KEYBOARD_RUNS.flatMap((run) => [run + run, [...(run + run)].reverse().join('')]);
  let rest = letters;
  for (let start = 0; start + RUN_MINIMUM_CHARACTERS <= rest.length;) {
    const runLength = longestRun(rest.slice(start), runs);
    if (runLength >= RUN_MINIMUM_CHARACTERS) rest = rest.slice(0, start) + rest.slice(start + runLength);
    else start += 1;
  }
  return rest;
}

function longestRun(text: string, runs: readonly string[]): number {
  let length = 0;
  while (length < text.length && runs.some((run) => run.includes(text.slice(0, length + 1)))) length += 1;
  return length;
}
