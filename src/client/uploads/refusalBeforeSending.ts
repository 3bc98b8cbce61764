import { ApiError } from '#client/api/ApiError.ts';
import { byteText } from '#lib/format/byteText.ts';
import { MAXIMUM_UPLOAD_BYTES } from '#lib/schemas/uploadLimits.ts';

/** The refusal that the server would give after the whole file was sent; null when only the server can tell. */
export function refusalBeforeSending(file: File): ApiError | null {
  if (file.size === 0) {
    return new ApiError({ code: 'empty-file', status: 422, detail: 'The file is empty (0 bytes). Record it again.' });
  }
  if (file.size > MAXIMUM_UPLOAD_BYTES) {
    return new ApiError({
      code: 'too-large',
      status: 413,
      detail: `The file has ${byteText(file.size)}; at most ${byteText(MAXIMUM_UPLOAD_BYTES)} are taken. Cut out the part to measure, or send the sound without the picture.`,
    });
  }
  return null;
}
