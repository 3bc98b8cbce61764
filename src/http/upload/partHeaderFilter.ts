import { Transform } from 'node:stream';
import { UNNAMED_FILE } from '#lib/schemas/fileName.ts';
import { invalidFields, ServerError } from '#server/errors.ts';

/**
 * Multipart parsers drop a file part whose name is empty and stop at a NUL without saying why. This filter stands
 * in front of the parser, looks at part headers only, and never touches a byte of content.
 */

const HEADER_MAXIMUM_BYTES = 16 * 1024;
const HEADER_END = Buffer.from('\r\n\r\n');
const CLOSING_DASHES = Buffer.from('--');
const EMPTY_FILE_NAME = /(;\s*filename=)""/i;
const NUL_IN_DISPOSITION = /^content-disposition:.*\0/im;

export class PartHeaderFilter extends Transform {
  readonly #delimiter: Buffer;
  /** Bytes that cannot be judged yet: the start of a delimiter, or a header that is not complete. */
  #pending: Buffer = Buffer.from('\r\n');
  #isInHeader = false;
  #isClosed = false;

  /** @param boundary of the Content-Type header */
  constructor(boundary: string) {
    super();
    // The first delimiter may stand at the very start; the line break that `pending` begins with makes it like the rest.
    this.#delimiter = Buffer.from(`\r\n--${boundary}`, 'latin1');
  }

  override _transform(chunk: Buffer, _encoding: BufferEncoding, done: (error?: Error) => void): void {
    this.#pending = this.#pending.length === 0 ? chunk : Buffer.concat([this.#pending, chunk]);
    try {
      while (this.#advance());
      done();
    } catch (error) {
      done(error as Error);
    }
  }

  override _flush(done: () => void): void {
    this.push(this.#pending);
    done();
  }

  /** @returns whether there may be more to do with what is pending */
  #advance(): boolean {
    if (this.#isClosed) return this.#passAllBut(0);
    return this.#isInHeader ? this.#passHeader() : this.#passContent();
  }

  #passContent(): boolean {
    const at = this.#pending.indexOf(this.#delimiter);
    if (at < 0) return this.#passAllBut(this.#delimiter.length - 1);
    this.#pass(at + this.#delimiter.length);
    this.#isInHeader = true;
    return true;
  }

  #passHeader(): boolean {
    if (this.#pending.length < CLOSING_DASHES.length) return false;
    if (this.#pending.subarray(0, CLOSING_DASHES.length).equals(CLOSING_DASHES)) {
      this.#isClosed = true;
      return true;
    }
    const at = this.#pending.indexOf(HEADER_END);
    if (at > HEADER_MAXIMUM_BYTES || (at < 0 && this.#pending.length > HEADER_MAXIMUM_BYTES)) throw headerTooLong();
    if (at < 0) return false;
    this.push(namedHeader(this.#pending.toString('latin1', 0, at)));
    this.#pending = this.#pending.subarray(at);
    this.#isInHeader = false;
    return true;
  }

  #passAllBut(keptBytes: number): false {
    this.#pass(Math.max(0, this.#pending.length - keptBytes));
    return false;
  }

  #pass(byteCount: number): void {
    if (byteCount > 0) this.push(this.#pending.subarray(0, byteCount));
    this.#pending = this.#pending.subarray(byteCount);
  }
}

function namedHeader(header: string): Buffer {
  if (NUL_IN_DISPOSITION.test(header)) {
    throw invalidFields([{ field: 'file', message: 'The file name must not contain a NUL character.' }]);
  }
  return Buffer.from(header.replace(EMPTY_FILE_NAME, `$1"${UNNAMED_FILE}"`), 'latin1');
}

function headerTooLong(): ServerError {
  return new ServerError({
    code: 'bad-request',
    detail: 'The header of one part of the upload is too long. Send the upload again as multipart/form-data.',
  });
}
