import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { attachment } from '#http/attachment.ts';

describe('attachment', () => {
  // RFC 6266 section 5 gives this name in both forms; RFC 8187 section 3.2.3 the escapes of £ and €.
  it.each([
    ['EURO rates', `attachment; filename="EURO rates"; filename*=UTF-8''EURO%20rates`],
    ['€ rates', `attachment; filename="_ rates"; filename*=UTF-8''%E2%82%AC%20rates`],
    ['£ and € rates', `attachment; filename="_ and _ rates"; filename*=UTF-8''%C2%A3%20and%20%E2%82%AC%20rates`],
    [
      `a"b\\c%d'e(f)*.wav`,
      `attachment; filename="a_b_c_d'e(f)*.wav"; filename*=UTF-8''a%22b%5Cc%25d%27e%28f%29%2A.wav`,
    ],
  ])('writes %s for both kinds of reader', (name, header) => {
    expect(attachment(name)).toBe(header);
  });

  it('is a legal header for any well-formed name, and the name comes back', () => {
    fc.assert(
      fc.property(
        fc.string({ unit: 'binary' }).map((text) => text.toWellFormed()),
        (name) => {
          const header = attachment(name);
          expect(new Headers({ 'content-disposition': header }).get('content-disposition')).toBe(header);
          expect(decodeURIComponent(header.split("filename*=UTF-8''").at(-1) ?? '')).toBe(name);
        },
      ),
      { seed: 1 },
    );
  });
});
