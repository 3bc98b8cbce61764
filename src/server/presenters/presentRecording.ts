import { UNSURE_BELOW_CONFIDENCE } from '#lib/analysis/reading.ts';
import type { SeriesName } from '#lib/analysis/series.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import type { RecordingWithRelations } from '../models/recordingDetails.ts';
import type { ReviewWithReviewer } from '../models/Review.ts';
import type { Actor } from '../policies/actor.ts';
import { recordingPolicy } from '../policies/recordingPolicy.ts';
import { presentReading } from './presentReading.ts';
import { presentReview } from './presentReview.ts';

interface RecordingDetails {
  readonly recording: RecordingWithRelations;
  readonly seriesNames: readonly SeriesName[];
  readonly review: ReviewWithReviewer | null;
}

export function presentRecording({ recording, seriesNames, review }: RecordingDetails, actor: Actor): RecordingView {
  const { currentReading, uploader } = recording;
  return {
    id: recording.id,
    benchId: recording.benchId,
    sessionId: recording.sessionId,
    fileName: recording.fileName,
    byteCount: recording.byteCount,
    sha256: recording.sha256.toString('hex'),
    status: recording.state,
    error: errorOf(recording),
    duplicateOf: recording.duplicateOf,
    build: buildOf(recording),
    supplyVolts: recording.supplyVolts,
    currentAmps: recording.currentAmps,
    note: recording.note,
    media: mediaOf(recording),
    uploadedBy: { id: uploader.id, name: uploader.name },
    createdAt: recording.createdAt.toISOString(),
    reading: currentReading && presentReading({ reading: currentReading, seriesNames }),
    review: review && presentReview(review),
    needsPerson: needsPerson(recording, review),
    abilities: {
      canReview: recordingPolicy.canReview(actor, recording),
      canEdit: recordingPolicy.canEdit(actor, recording),
      canAnalyseAgain: recordingPolicy.canAnalyseAgain(actor, recording),
    },
  };
}

/** The same rule as NEEDS_PERSON_SQL, for a row that is loaded. */
function needsPerson({ state, currentReading }: RecordingWithRelations, review: ReviewWithReviewer | null): boolean {
  if (state === 'failed') return true;
  const confidence = currentReading?.confidence ?? 1;
  return state === 'done' && confidence < UNSURE_BELOW_CONFIDENCE && review === null;
}

function errorOf({ state, errorCode, errorMessage }: RecordingWithRelations): RecordingView['error'] {
  if (state !== 'failed' || errorCode === null) return null;
  return { code: errorCode, message: errorMessage ?? '' };
}

/** The revision is the one that was recorded; name and geometry are today's. */
function buildOf({ build, buildRevision }: RecordingWithRelations): RecordingView['build'] {
  if (build === null) return null;
  const { id, name, revision, geometry, eventsPerTurn } = build;
  return { id, name, revision: buildRevision ?? revision, geometry, eventsPerTurn };
}

function mediaOf(recording: RecordingWithRelations): RecordingView['media'] {
  const { container, codec, sampleRateHz, channelCount, durationSeconds } = recording;
  return { container, codec, sampleRateHz, channelCount, durationSeconds };
}
