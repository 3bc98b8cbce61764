import { problemBody, type ProblemBody } from '#lib/schemas/problem.ts';

/** Code of an ApiError that never reached the server. */
export const UNREACHABLE_CODE = 'unreachable';
/** Code of an answer that is not what this page's version of the product expects. */
export const UNEXPECTED_ANSWER_CODE = 'unexpected-answer';

const SERVER_ERROR_STATUS = 500;
const TOO_MANY_REQUESTS_STATUS = 429;
const REQUEST_TIMEOUT_STATUS = 408;

export type FieldErrors = Readonly<Record<string, string>>;

interface ApiErrorFields {
  readonly code: string;
  readonly status: number;
  readonly detail: string;
  readonly requestId?: string | undefined;
  readonly fieldErrors?: FieldErrors | undefined;
  readonly cause?: unknown;
}

/** Whatever kept a request from its answer, in words that can stand on the page. */
export class ApiError extends Error {
  /** Permanent kebab-case id: the server's, or one of the two above. */
  readonly code: string;
  /** HTTP status; 0 when no answer came. */
  readonly status: number;
  /** What happened, why, and what to do; for people. */
  readonly detail: string;
  readonly requestId: string | null;
  /** Message by field name; empty when the refusal is not about a field. */
  readonly fieldErrors: FieldErrors;

  constructor({ code, status, detail, requestId, fieldErrors, cause }: ApiErrorFields) {
    super(detail, { cause });
    this.name = 'ApiError';
    this.code = code;
    this.status = status;
    this.detail = detail;
    this.requestId = requestId ?? null;
    this.fieldErrors = fieldErrors ?? {};
  }

  /** Whether the same request may succeed later without anybody changing it. */
  get isTransient(): boolean {
    return (
      this.status === 0 ||
      this.status >= SERVER_ERROR_STATUS ||
      this.status === TOO_MANY_REQUESTS_STATUS ||
      this.status === REQUEST_TIMEOUT_STATUS
    );
  }
}

/** The error of a request that got no answer: no network, or the server is away. */
export function unreachableError(cause?: unknown): ApiError {
  return new ApiError({
    code: UNREACHABLE_CODE,
    status: 0,
    detail: 'Ripplebench cannot be reached. Check the connection; what is on this page stays here.',
    cause,
  });
}

/** The error that an answer other than 2xx stands for, whether or not its body is a problem body. */
export function errorFromAnswer(status: number, bodyText: string): ApiError {
  const problem = parseProblem(bodyText);
  if (problem === null) {
    return new ApiError({
      code: UNEXPECTED_ANSWER_CODE,
      status,
      detail: `Ripplebench gave an answer that this page does not understand (status ${String(status)}). Try again in a moment.`,
    });
  }
  return new ApiError({
    code: problem.code,
    status,
    detail: problem.detail,
    requestId: problem.requestId,
    fieldErrors: Object.fromEntries((problem.errors ?? []).map(({ field, message }) => [field, message])),
  });
}

function parseProblem(bodyText: string): ProblemBody | null {
  try {
    const parsed = problemBody.safeParse(JSON.parse(bodyText));
    return parsed.success ? parsed.data : null;
  } catch {
    return null;
  }
}
