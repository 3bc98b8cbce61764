import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { PartHeaderFilter } from '#http/upload/partHeaderFilter.ts';

const BOUNDARY = 'b0undary';

/** What leaves the filter when a body comes in pieces of this many bytes. */
async function filtered(body: string, pieceBytes = 7): Promise<string> {
  const filter = new PartHeaderFilter(BOUNDARY);
  const bytes = Buffer.from(body, 'latin1');
  const chunks: Buffer[] = [];
  const end = new Promise((resolve, reject) => {
    filter
      .on('data', (chunk: Buffer) => chunks.push(chunk))
      .on('end', resolve)
      .on('error', reject);
  });
  for (let at = 0; at < bytes.length; at += pieceBytes) filter.write(bytes.subarray(at, at + pieceBytes));
  filter.end();
  await end;
  return Buffer.concat(chunks).toString('latin1');
}

const part = (disposition: string, content: string) =>
  `--${BOUNDARY}\r\nContent-Disposition: form-data; ${disposition}\r\n\r\n${content}\r\n`;
const END = `--${BOUNDARY}--\r\n`;

describe('PartHeaderFilter', () => {
  it('names a file part whose name is empty, in pieces of every length', async () => {
    const body = part('name="note"', 'x') + part('name="file"; filename=""', 'sound') + END;
    const named = `\r\n${body.replace('filename=""', 'filename="unnamed"')}`;
    for (let pieceBytes = 1; pieceBytes <= body.length; pieceBytes += 1) {
      expect(await filtered(body, pieceBytes)).toBe(named);
    }
  });

  it('leaves content alone, also content that looks like a header or nearly like a boundary', async () => {
    const content = `Content-Disposition: form-data; filename=""\r\n\r\n\r\n--b0undar filename=""\0\r\n--`;
    const body = part('name="file"; filename="a.wav"', content) + END;
    expect(await filtered(body)).toBe(`\r\n${body}`);
  });

  it('leaves any content alone, however it is cut', async () => {
    const bytes = fc.uint8Array({ maxLength: 300 }).map((values) => Buffer.from(values).toString('latin1'));
    await fc.assert(
      fc.asyncProperty(bytes, fc.integer({ min: 1, max: 64 }), async (content, pieceBytes) => {
        const body = part('name="file"; filename="a.wav"', content) + END;
        expect(await filtered(body, pieceBytes)).toBe(`\r\n${body}`);
      }),
      { seed: 1, numRuns: 200 },
    );
  });

  it('passes on what follows the end, and a body that never ends', async () => {
    expect(await filtered(END + 'x'.repeat(20_000))).toBe(`\r\n${END}${'x'.repeat(20_000)}`);
    expect(await filtered('no form at all')).toBe('\r\nno form at all');
    expect(await filtered(`--${BOUNDARY}\r\nhalf a header`)).toBe(`\r\n--${BOUNDARY}\r\nhalf a header`);
  });

  it('refuses a NUL in a name, and a header of more than 16 kB as soon as it is one', async () => {
    await expect(filtered(part('name="file"; filename="a\0b.wav"', '') + END)).rejects.toMatchObject({
      code: 'invalid-fields',
    });
    const endless = `--${BOUNDARY}\r\nContent-Disposition: form-data; name="${'x'.repeat(20_000)}`;
    await expect(filtered(endless, 1000)).rejects.toMatchObject({ code: 'bad-request' });
  });
});
