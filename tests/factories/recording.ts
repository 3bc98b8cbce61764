import { randomBytes } from 'node:crypto';
import { v4 as uuidV4 } from 'uuid';
import { DEFAULT_ANALYSIS_SETTINGS } from '#lib/analysis/settings.ts';
import type { ReviewDecision } from '#lib/schemas/reading.ts';
import { Reading } from '#server/models/Reading.ts';
import { Recording } from '#server/models/Recording.ts';
import { Review } from '#server/models/Review.ts';

interface RecordingRow {
  readonly benchId: string;
  readonly uploadedBy: string;
  readonly sessionId?: string | null;
  readonly buildId?: string | null;
  readonly supplyVolts?: number | null;
  readonly fileName?: string;
}

/** The row of a recording that has failed, without a file behind it. */
export async function createFailedRecording(row: RecordingRow): Promise<Recording> {
  return Recording.create({
    ...columnsOf(row),
    state: 'failed',
    errorCode: 'truncated',
    errorMessage: 'Not finished.',
  });
}

interface MeasuredRow extends RecordingRow {
  readonly rpm: number;
  /** Half of the 95 % interval, rpm. */
  readonly halfWidthRpm?: number;
  readonly confidence?: number;
}

/** The rows of a recording whose speed has been measured, without a file behind it. */
export async function createMeasuredRecording(row: MeasuredRow): Promise<{ recording: Recording; reading: Reading }> {
  const { rpm, halfWidthRpm = 2, confidence = 0.97 } = row;
  const recording = await Recording.create({ ...columnsOf(row), state: 'done' });
  const reading = await Reading.create({
    benchId: row.benchId,
    recordingId: recording.id,
    engineVersion: 'test',
    settingsHash: randomBytes(32),
    settings: DEFAULT_ANALYSIS_SETTINGS,
    status: 'measured',
    motion: 'steady',
    shaftSpeedRpm: rpm,
    lowRpm: rpm - halfWidthRpm,
    highRpm: rpm + halfWidthRpm,
    confidence,
    eventHz: rpm / 10,
    eventsPerTurn: 6,
    candidates: [],
    warnings: [],
    durationSeconds: 3,
    sampleRateHz: 48_000,
    elapsedSeconds: 0.1,
  });
  const where = { id: recording.id, benchId: row.benchId };
  await Recording.update({ currentReadingId: reading.id }, { where });
  return { recording, reading };
}

export async function createReview(
  reading: Reading,
  review: { reviewerId: string; decision: ReviewDecision; rpm?: number },
): Promise<void> {
  await Review.create({
    benchId: reading.benchId,
    recordingId: reading.recordingId,
    readingId: reading.id,
    reviewerId: review.reviewerId,
    decision: review.decision,
    shaftSpeedRpm: review.rpm ?? null,
    reason: '',
  });
}

function columnsOf({ fileName = 'motor.wav', ...row }: RecordingRow) {
  return {
    benchId: row.benchId,
    uploadedBy: row.uploadedBy,
    sessionId: row.sessionId ?? null,
    buildId: row.buildId ?? null,
    buildRevision: row.buildId == null ? null : 1,
    supplyVolts: row.supplyVolts ?? null,
    fileName,
    byteCount: 288_044,
    sha256: randomBytes(32),
    blobId: uuidV4(),
    container: 'wav',
    codec: 'pcm_s16le',
    sampleRateHz: 48_000,
    channelCount: 1,
    durationSeconds: 3,
  };
}
