/**
 * The catalogue of everything that can go wrong on purpose. The id is permanent: clients rely on it. `isReported`
 * says whether an operator should hear of it, `isRetryable` whether the same call may succeed later.
 */
interface CatalogueEntry {
  readonly status: number;
  readonly title: string;
  readonly isReported?: true;
  readonly isRetryable?: true;
}

export const ERROR_CATALOGUE = {
  // Requests
  'bad-request': { status: 400, title: 'The request cannot be read' },
  'invalid-fields': { status: 422, title: 'Some fields are not valid' },
  'not-signed-in': { status: 401, title: 'Sign in first' },
  'wrong-credentials': { status: 401, title: 'E-mail or password is wrong' },
  forbidden: { status: 403, title: 'Not allowed' },
  'cross-site': { status: 403, title: 'The request came from another site' },
  'not-found': { status: 404, title: 'Not found' },
  'no-such-series': { status: 404, title: 'This reading has no such series' },
  'link-not-valid': { status: 404, title: 'This link is not valid any more' },
  'method-not-allowed': { status: 405, title: 'Method not allowed' },
  'request-timeout': { status: 408, title: 'The upload was too slow' },
  conflict: { status: 409, title: 'The record has changed meanwhile' },
  'too-large': { status: 413, title: 'The file is too large' },
  'unsupported-media-type': { status: 415, title: 'This content type is not read here' },
  'key-reused': { status: 422, title: 'The idempotency key was used for another file' },
  'too-many-requests': { status: 429, title: 'Too many requests', isRetryable: true },
  'too-many-waiting': { status: 429, title: 'Too many recordings are waiting', isRetryable: true },
  // Files refused before they are acknowledged
  'empty-file': { status: 422, title: 'The file is empty' },
  'no-audio': { status: 422, title: 'The file has no sound' },
  'not-audio': { status: 422, title: 'The file is not a recording' },
  'too-short': { status: 422, title: 'The recording is too short' },
  'too-long': { status: 422, title: 'The recording is too long' },
  'bad-header': { status: 422, title: 'The file header is not valid' },
  'unsupported-rate': { status: 422, title: 'The sample rate is not supported' },
  'probe-timed-out': { status: 503, title: 'The file could not be examined in time', isRetryable: true },
  'too-many-channels': { status: 422, title: 'The recording has too many channels' },
  // Files that failed after they were acknowledged (stored with the recording)
  'cannot-decode': { status: 422, title: 'The recording cannot be decoded' },
  truncated: { status: 422, title: 'The recording was not finished' },
  'not-finite': { status: 422, title: 'The recording contains invalid samples' },
  'out-of-range': { status: 422, title: 'The recording contains impossible levels' },
  'file-missing': { status: 503, title: 'The stored file is missing', isReported: true },
  'worker-lost': { status: 503, title: 'The analysis was interrupted too often', isReported: true },
  // The server
  'storage-full': { status: 507, title: 'There is no room for more recordings', isReported: true, isRetryable: true },
  'storage-unavailable': { status: 503, title: 'Storage is not available', isReported: true, isRetryable: true },
  'database-unavailable': { status: 503, title: 'The database is not available', isReported: true, isRetryable: true },
  'shutting-down': { status: 503, title: 'The server is restarting', isRetryable: true },
  internal: { status: 500, title: 'Something went wrong here', isReported: true },
} as const satisfies Record<string, CatalogueEntry>;

export type ErrorCode = keyof typeof ERROR_CATALOGUE;

export interface FieldError {
  readonly field: string;
  readonly message: string;
}

interface ServerErrorOptions {
  readonly code: ErrorCode;
  /** What happened, why, and what to do, for the person who reads it. */
  readonly detail: string;
  readonly fieldErrors?: readonly FieldError[];
  readonly retryAfterSeconds?: number;
  readonly cause?: unknown;
}

/** An expected refusal or failure, on its way to a problem body or a stored result. */
export class ServerError extends Error {
  readonly code: ErrorCode;
  readonly detail: string;
  readonly fieldErrors: readonly FieldError[];
  readonly retryAfterSeconds: number | null;

  constructor(options: ServerErrorOptions) {
    super(`${options.code}: ${options.detail}`, { cause: options.cause });
    this.name = 'ServerError';
    this.code = options.code;
    this.detail = options.detail;
    this.fieldErrors = options.fieldErrors ?? [];
    this.retryAfterSeconds = options.retryAfterSeconds ?? null;
  }

  get status(): number {
    return ERROR_CATALOGUE[this.code].status;
  }
}

/** A record that does not exist and one that belongs to another bench look exactly alike. */
export function notFound(what: string): ServerError {
  return new ServerError({
    code: 'not-found',
    detail: `There is no such ${what} here. Check the address, or whether you are signed in to the right bench.`,
  });
}

/** The record is readable, but not this act on it. */
export function forbidden(): ServerError {
  return new ServerError({
    code: 'forbidden',
    detail: 'Your role in this bench, or your token, does not allow that. Ask an owner or a lead of the bench.',
  });
}

export function invalidFields(fieldErrors: readonly FieldError[]): ServerError {
  const lines = fieldErrors.map(({ field, message }) => (field === '' ? message : `${field}: ${message}`));
  return new ServerError({
    code: 'invalid-fields',
    detail: lines.join(' '),
    fieldErrors,
  });
}
