import { ServerError } from '#server/errors.ts';
import { readBytes, refuseContentEncoding } from './readJsonBody.ts';

const FORM_CONTENT_TYPE = /^application\/x-www-form-urlencoded(?:\s*;.*)?$/i;

/**
 * The fields of a plain HTML form.
 *
 * @throws ServerError unsupported-media-type for any other body, too-large above the limit of a JSON body
 */
export async function readFormBody(request: Request): Promise<URLSearchParams> {
  refuseContentEncoding(request);
  if (!FORM_CONTENT_TYPE.test(request.headers.get('content-type') ?? '')) {
    throw new ServerError({ code: 'unsupported-media-type', detail: 'This page takes the form that stands on it.' });
  }
  return new URLSearchParams((await readBytes(request)).toString('utf8'));
}
