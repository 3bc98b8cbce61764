import type { ApiError } from '#client/api/ApiError.ts';
import type { UploadFields } from '#lib/schemas/recording.ts';

/** Where one file is on its way to the server. What happens after `received` is the recording's own status. */
export type UploadState =
  | { readonly phase: 'waiting' }
  | { readonly phase: 'sending'; readonly sentBytes: number }
  /** Broken off through no fault of the file; goes on by itself. */
  | { readonly phase: 'paused'; readonly error: ApiError; readonly pauseSeconds: number }
  | { readonly phase: 'received'; readonly recordingId: string; readonly duplicateOf: string | null }
  | { readonly phase: 'refused'; readonly error: ApiError }
  | { readonly phase: 'cancelled' };

export interface Upload {
  /** Also the Idempotency-Key of every attempt, so that no attempt makes a second recording. */
  readonly key: string;
  readonly file: File;
  readonly fields: UploadFields;
  readonly state: UploadState;
  /** Attempts that broke off since the file was added or retried by hand. */
  readonly brokenAttemptCount: number;
}

/** Whether leaving the page now would lose this file. */
export function isUnfinished(upload: Upload): boolean {
  return upload.state.phase === 'waiting' || upload.state.phase === 'sending' || upload.state.phase === 'paused';
}
