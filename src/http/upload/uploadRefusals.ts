import { MulterError } from 'multer';
import { byteText } from '#lib/format/byteText.ts';
import { MAXIMUM_UPLOAD_BYTES } from '#lib/schemas/uploadLimits.ts';
import { invalidFields, ServerError } from '#server/errors.ts';

/** What an upload is told when its form cannot be taken. */

export function tooLarge(): ServerError {
  return new ServerError({
    code: 'too-large',
    detail: `The file is larger than ${byteText(MAXIMUM_UPLOAD_BYTES)}. Cut out the part to measure and upload that.`,
  });
}

export function notMultipart(): ServerError {
  return new ServerError({
    code: 'unsupported-media-type',
    detail: 'Send the recording as multipart/form-data with one file, without Content-Encoding.',
  });
}

export function malformedForm(cause?: unknown): ServerError {
  return new ServerError({
    code: 'bad-request',
    detail: 'The upload could not be read to its end as multipart/form-data with exactly one file. Send it again.',
    cause,
  });
}

/** Whatever ended the reading of a form, as the catalogue knows it. */
export function uploadRefusal(error: unknown): ServerError {
  if (error instanceof ServerError) return error;
  if (error instanceof MulterError && error.code === 'LIMIT_FIELD_VALUE' && error.field !== undefined) {
    const message = error.field === 'file' ? 'Must be a file, sent with a file name.' : 'Is too long.';
    return invalidFields([{ field: error.field, message }]);
  }
  return malformedForm(error);
}
