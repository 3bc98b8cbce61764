import { logger } from '#server/logger.ts';
import { type RecordingClaim, renewLease } from '#server/models/recordingClaims.ts';

/** Three renewals a lease: two may fail before the claim is lost. */
const RENEWALS_PER_LEASE = 3;

interface KeptClaim {
  readonly claim: RecordingClaim;
  readonly leaseSeconds: number;
  /** Called once when another worker or a person has taken the recording away. */
  readonly onLost: () => void;
}

/**
 * Renews the lease of a claim until the returned function is called. A database that is away for a while does not
 * end the work: the fence decides about the result.
 */
export function keepClaim({ claim, leaseSeconds, onLost }: KeptClaim): () => void {
  const renew = async (): Promise<void> => {
    try {
      if (await renewLease(claim, leaseSeconds)) return;
    } catch (error) {
      logger().warn({ err: error, recordingId: claim.recordingId }, 'the lease was not renewed');
      return;
    }
    clearInterval(timer);
    onLost();
  };
  const timer = setInterval(() => void renew(), (leaseSeconds / RENEWALS_PER_LEASE) * 1000);
  return () => {
    clearInterval(timer);
  };
}
