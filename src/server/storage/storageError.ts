import { ServerError } from '../errors.ts';

const FULL_CODES: readonly string[] = ['ENOSPC', 'EDQUOT'];
const FULL_RETRY_SECONDS = 300;
const UNAVAILABLE_RETRY_SECONDS = 15;

export function storageFull(detail: string, cause?: unknown): ServerError {
  return new ServerError({ code: 'storage-full', detail, retryAfterSeconds: FULL_RETRY_SECONDS, cause });
}

/** The file system's own words for a failure, turned into the catalogue's. Paths stay in `cause`, for the log only. */
export function storageError(cause: unknown): ServerError {
  if (cause instanceof ServerError) return cause;
  if (FULL_CODES.includes(systemCode(cause) ?? '')) {
    return storageFull(
      'The disk is full, so nothing was stored. Tell whoever runs this server, then try again.',
      cause,
    );
  }
  return new ServerError({
    code: 'storage-unavailable',
    detail: 'The storage for recordings does not answer, so nothing was stored. Try again in a moment.',
    retryAfterSeconds: UNAVAILABLE_RETRY_SECONDS,
    cause,
  });
}

/** Failures on the way to a stored blob: a blob that is not there is the alarm `file-missing`. */
export function blobError(cause: unknown): ServerError {
  if (systemCode(cause) !== 'ENOENT') return storageError(cause);
  return new ServerError({
    code: 'file-missing',
    detail: 'The file of this recording is missing from storage. Tell whoever runs this server.',
    cause,
  });
}

/** "ENOENT" and the like; null when `error` does not come from the operating system. */
export function systemCode(error: unknown): string | null {
  return error instanceof Error && 'code' in error && typeof error.code === 'string' ? error.code : null;
}
