import { Readable } from 'node:stream';
import type { ReadableStream as NodeReadableStream } from 'node:stream/web';
import { ServerError } from '#server/errors.ts';

/** Above the longest note that any call takes, so that an overlong field is named instead of cut off. */
export const JSON_BODY_MAXIMUM_BYTES = 2_000_000;

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
export async function readBytes(request: Request): Promise<Buffer> {
  if (request.body === null) return Buffer.alloc(0);
  const chunks: Uint8Array[] = [];
  let byteCount = 0;
  for await (const chunk of Readable.fromWeb(
    request.body as NodeReadableStream<Uint8Array>,
  ) as AsyncIterable<Uint8Array>) {
    byteCount += chunk.byteLength;
    if (byteCount > JSON_BODY_MAXIMUM_BYTES) {
      const limitMegabytes = JSON_BODY_MAXIMUM_BYTES / 1e6;
      throw new ServerError({
        code: 'too-large',
        detail: `The body is above ${String(limitMegabytes)} MB.`,
      });
    }
    chunks.push(chunk);
  }
  return Buffer.concat(chunks);
}
