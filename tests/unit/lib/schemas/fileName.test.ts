import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { shownFileName } from '#lib/schemas/fileName.ts';

describe('shownFileName', () => {
  it.each([
    ['run 3.wav', 'run 3.wav'],
    ['../../etc/cron.d/x', 'x'],
    ['C:\\motors\\run 3.wav', 'run 3.wav'],
    ['/abs', 'abs'],
    ['folder/', 'unnamed'],
    [' ', 'unnamed'],
    ['..', 'unnamed'],
    ['a\r\nb\tc\0.wav', 'abc.wav'],
    ['evil\u202Evaw.exe', 'evilvaw.exe'],
    ['e\u0301.wav', 'e\u0301.wav'],
    ['👩‍🔧 motor.wav', '👩‍🔧 motor.wav'],
    ['a\ud800b', 'a\uFFFDb'],
  ])('shows %j as %j', (given, shown) => {
    expect(shownFileName(given)).toBe(shown);
  });

  it('cuts a name of 5000 characters to 255 in front of its extension, and says so', () => {
    expect(shownFileName(`${'x'.repeat(5000)}.wav`)).toBe(`${'x'.repeat(250)}….wav`);
    expect(shownFileName('🌀'.repeat(300))).toBe(`${'🌀'.repeat(254)}…`);
  });

  it('gives 1 to 255 showable characters for any name, and the same when asked again', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 600 }), (given) => {
        const shown = shownFileName(given);
        expect([...shown].length).toBeGreaterThanOrEqual(1);
        expect([...shown].length).toBeLessThanOrEqual(255);
        expect(shown).not.toMatch(/[\p{Cc}/\\\u202A-\u202E\u2066-\u2069]/u);
        expect(shownFileName(shown)).toBe(shown);
      }),
      { seed: 1, numRuns: 500 },
    );
  });
});
