import { inTransaction } from '../database/inTransaction.ts';
import { failClaim, type RecordingClaim } from '../models/recordingClaims.ts';
import { announceRecording } from './announceRecording.ts';

export interface RecordingFailure {
  /** Kebab-case, from the error catalogue or from the media helper. */
  readonly code: string;
  /** What happened, why, and what to do, for the person who made the recording. */
  readonly message: string;
}

/**
 * Stores an expected failure, such as an unreadable file, as the result; it is not tried again.
 *
 * @returns false when the claim was lost and nothing was stored
 */
export function failRecording({
  claim,
  failure,
}: {
  claim: RecordingClaim;
  failure: RecordingFailure;
}): Promise<boolean> {
  return inTransaction(async (transaction) => {
    if (!(await failClaim(claim, failure, transaction))) return false;
    await announceRecording(claim, 'failed', transaction);
    return true;
  });
}
