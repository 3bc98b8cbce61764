import type { ErrorCode } from '../errors.ts';
import { ServerError } from '../errors.ts';
import { MediaRefused } from '../media/mediaErrors.ts';
import { probeMedia } from '../media/probeMedia.ts';
import type { TemporaryBlob } from '../storage/storage.ts';

const PROBE_RETRY_SECONDS = 60;

/**
 * What the file says of itself, as the columns of a recording.
 *
 * @throws ServerError with the code and the words for the person who uploads, when it is not a usable recording
 */
export async function examineUpload(temporary: TemporaryBlob) {
  try {
    const probe = await probeMedia(temporary.pathForReading);
    return {
      container: probe.container,
      codec: probe.codec,
      sampleRateHz: probe.sampleRateHz,
      channelCount: probe.channelCount,
      durationSeconds: probe.declaredDurationSeconds,
      mediaWarnings: [...probe.warnings],
    };
  } catch (error) {
    if (!(error instanceof MediaRefused)) throw error;
    const code: ErrorCode = error.code;
    const isBusy = code === 'probe-timed-out';
    throw new ServerError({
      code,
      detail: error.message,
      cause: error,
      ...(isBusy && { retryAfterSeconds: PROBE_RETRY_SECONDS }),
    });
  }
}
