import { Readable } from 'node:stream';
import type { ReadableStream } from 'node:stream/web';
import { ServerError } from '#server/errors.ts';
import { linger } from './linger.ts';

/** Above the longest note that any call takes, so that an overlong field is named instead of cut off. */
const JSON_BODY_MAXIMUM_BYTES = 2_000_000;

const JSON_CONTENT_TYPE = /^application\/json(?:\s*;\s*charset=(?:"?utf-8"?))?\s*$/i;

/**
 * The parsed JSON body of a request.
 *
 * @throws ServerError unsupported-media-type for another content type or any content encoding, too-large above the
 *   limit, bad-request for what is not JSON in UTF-8.
 */
export async function readJsonBody(request: Request): Promise<unknown> {
  refuseContentEncoding(request);
  if (!JSON_CONTENT_TYPE.test(request.headers.get('content-type') ?? '')) {
    throw new ServerError({
      code: 'unsupported-media-type',
      detail: 'Send the body as JSON with the header Content-Type: application/json.',
    });
  }
  const bytes = await readBytes(request);
  try {
    return JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes)) as unknown;
  } catch (cause) {
    throw new ServerError({
      code: 'bad-request',
      detail: 'The body is not valid JSON in UTF-8.',
      cause,
    });
  }
}

/** A compressed body could unfold to any size. */
export function refuseContentEncoding(request: Request): void {
  const encoding = request.headers.get('content-encoding');
  if (encoding === null || encoding.toLowerCase() === 'identity') return;
  throw new ServerError({
    code: 'unsupported-media-type',
    detail: 'Send the body without a Content-Encoding.',
  });
}

/** The raw body, up to the limit. @throws ServerError too-large */
export async function readBytes({ body }: Request): Promise<Buffer> {
  if (body === null) return Buffer.alloc(0);
  const source = Readable.fromWeb(body as ReadableStream<Uint8Array>);
  const chunks: Uint8Array[] = [];
  let byteCount = 0;
  return new Promise((resolve, reject) => {
    source.on('data', (chunk: Uint8Array) => {
      chunks.push(chunk);
      byteCount += chunk.byteLength;
      if (byteCount <= JSON_BODY_MAXIMUM_BYTES) return;
      source.removeAllListeners('data');
      linger(source);
      reject(tooLarge());
    });
    source.once('end', () => {
      resolve(Buffer.concat(chunks));
    });
    source.once('error', (cause) => {
      reject(new ServerError({ code: 'bad-request', detail: 'The body ended before its end.', cause }));
    });
  });
}

function tooLarge(): ServerError {
  const limitMegabytes = JSON_BODY_MAXIMUM_BYTES / 1e6;
  return new ServerError({ code: 'too-large', detail: `The body is above ${String(limitMegabytes)} MB.` });
}
