import { describe, expect, it } from 'vitest';
import { momentText } from '#lib/format/momentText.ts';

describe('momentText', () => {
  it('names UTC', () => {
    expect(momentText('2026-12-01T14:31:05.120Z', 'UTC')).toBe('1 Dec 2026, 14:31 UTC');
  });

  it('gives local time without a zone: New York is 5 h behind in winter', () => {
    expect(momentText('2026-12-01T02:31:05.120Z', 'America/New_York')).toBe('30 Nov 2026, 21:31');
  });

  it('refuses what is not a moment', () => {
    expect(() => momentText('soon', 'UTC')).toThrow(RangeError);
  });
});
