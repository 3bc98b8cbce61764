import { ServerError } from '#server/errors.ts';
import { logger } from '#server/logger.ts';
import { Device } from '#server/models/Device.ts';
import { Recording } from '#server/models/Recording.ts';
import type { RecordingClaim } from '#server/models/recordingClaims.ts';
import { blobStorage } from '#server/storage/blobStorage.ts';
import { failRecording } from '#server/usecases/failRecording.ts';
import { noteDecoderCrash } from '#server/usecases/noteDecoderCrash.ts';
import { resolveAnalysisSettings } from '#server/usecases/resolveAnalysisSettings.ts';
import { storeReading } from '#server/usecases/storeReading.ts';
import type { AnalysisThread } from '../threads/AnalysisThread.ts';

interface AnalysisJob {
  readonly claim: RecordingClaim;
  readonly thread: AnalysisThread;
  /** Ends the work when the claim is lost or the worker stops. */
  readonly signal: AbortSignal;
}

/** Analyses one claimed recording and stores what comes out: a reading, or the reason why there is none. */
export async function analyseRecording({ claim, thread, signal }: AnalysisJob): Promise<void> {
  const { recordingId: id, benchId } = claim;
  const recording = await Recording.findOne({ where: { id, benchId }, include: 'build' });
  if (recording === null) return;
  const path = await blobStorage().pathForReading(recording.blobId).catch(missingOrThrow);
  if (path instanceof ServerError) {
    logger().error({ recordingId: id, blobId: recording.blobId }, 'ALARM: a recording without its file');
    await failRecording({ claim, failure: { code: path.code, message: path.detail } });
    return;
  }
  const device = recording.deviceId && (await Device.findOne({ where: { id: recording.deviceId, benchId } }));
  const settings = resolveAnalysisSettings({
    recording,
    build: recording.build ?? null,
    clockCorrectionPpm: device ? device.clockCorrectionPpm : null,
  });
  const outcome = await thread.run({ path, settings, warnings: recording.mediaWarnings }, signal);
  switch (outcome.kind) {
    case 'analysed': {
      const { analysis, elapsedSeconds } = outcome;
      const isStored = await storeReading({ claim, analysis, settings, elapsedSeconds });
      logger().info({ recordingId: id, isStored, elapsedSeconds }, 'analysed');
      return;
    }
    case 'unreadable':
      await failRecording({ claim, failure: { code: outcome.code, message: outcome.message } });
      return;
    case 'crashed':
      logger().error({ recordingId: id, cause: outcome.cause }, 'the decoder or the analysis crashed');
      await noteDecoderCrash({ claim });
      return;
  }
}

function missingOrThrow(error: unknown): ServerError {
  if (error instanceof ServerError && error.code === 'file-missing') return error;
  throw error;
}
