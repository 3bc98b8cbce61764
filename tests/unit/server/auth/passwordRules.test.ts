import { describe, expect, it } from 'vitest';
import { refuseWeakPassword } from '#server/auth/passwordRules.ts';

const ACCOUNT = { email: 'hanna.weber@example.org', name: 'Hanna Weber' };

function refusalOf(password: string): string | null {
  try {
    refuseWeakPassword(password, ACCOUNT);
    return null;
  } catch (error) {
    expect(error).toMatchObject({ code: 'invalid-fields', fieldErrors: [{ field: 'password' }] });
    return (error as { fieldErrors: { message: string }[] }).fieldErrors[0]?.message ?? '';
  }
}

describe('refuseWeakPassword', () => {
  it.each([
    ['11 characters', 'k7#mQ2!xZp9', 'at least 12'],
    ['129 characters', 'k7#m'.repeat(32) + 'x', 'at most 128'],
    ['one character over and over', 'aaaaaaaaaaaaaa', 'too few'],
    ['a few characters in turn', 'abababababab', 'too few'],
    ['a common password with a number', 'password1234', 'most common'],
    ['the same with capitals and signs', 'PassWord!2024!', 'most common'],
    ['two common words', 'welcomeadmin12', 'most common'],
    ['the keyboard', 'qwertyuiop12', 'most common'],
    ['the keyboard backwards', '0987654321po', 'most common'],
    ['counting', '123456789012', 'most common'],
    ['the alphabet', 'abcdefghijkl', 'most common'],
    ['the product', 'ripplebench!', 'most common'],
    ['the own name', 'hannaweber2024', 'name or address'],
    ['the own address', 'hanna.weber@example', 'name or address'],
  ])('refuses %s', (_what, password, reason) => {
    expect(refusalOf(password)).toContain(reason);
  });

  it.each([
    ['four words', 'correct horse battery staple'],
    ['12 characters at random', 'k7#mQ2!xZp9v'],
    ['digits at random', '839205716649'],
    ['a common word among others', 'my password is a heron'],
    ['128 characters', 'k7#m'.repeat(32).slice(0, 127) + 'ü'],
    ['another script', 'пятьмоторовнастоле'],
    ['emoji', '🔧🧲⚡🌀🔋🧪🛞 motors'],
  ])('takes %s', (_what, password) => {
    expect(refusalOf(password)).toBeNull();
  });
});
