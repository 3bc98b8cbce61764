import { describe, expect, it } from 'vitest';
import { byteText } from '#lib/format/byteText.ts';

describe('byteText', () => {
  it.each([
    [0, '0 bytes'],
    [999, '999 bytes'],
    [1920, '2 kB'],
    [90_000, '90 kB'],
    [12_400_000, '12.4 MB'],
    [200_000_000, '200 MB'],
  ])('writes %d bytes as %s', (byteCount, text) => {
    expect(byteText(byteCount)).toBe(text);
  });
});
