import type { SeriesName } from '#lib/analysis/series.ts';
import { notFound } from '../errors.ts';
import { loadRecordingInBenches, type RecordingWithRelations } from '../models/recordingDetails.ts';
import type { Reading } from '../models/Reading.ts';
import { ReadingSeries } from '../models/ReadingSeries.ts';
import { Review, type ReviewWithReviewer } from '../models/Review.ts';
import { readableBenchIds } from '../policies/abilities.ts';
import type { Actor } from '../policies/actor.ts';

/** A recording with what its page tells about it. */
export interface RecordingDetails {
  readonly recording: RecordingWithRelations;
  /** Of the current reading; null without one. */
  readonly seriesNames: readonly SeriesName[];
  /** The review of the current reading that counts. */
  readonly review: ReviewWithReviewer | null;
}

/** A reading with the names of the evidence that it has. */
export interface ReadingDetails {
  readonly reading: Reading;
  readonly seriesNames: readonly SeriesName[];
}

/** The bench belongs to the question: a foreign recording is not there. @throws ServerError not-found */
export async function loadReadableRecording(actor: Actor, recordingId: string): Promise<RecordingWithRelations> {
  const recording = await loadRecordingInBenches(recordingId, readableBenchIds(actor));
  if (recording === null) throw notFound('recording');
  return recording;
}

/** Two more queries, however many recordings. */
export async function withDetails(recordings: readonly RecordingWithRelations[]): Promise<RecordingDetails[]> {
  const benchIds = [...new Set(recordings.map(({ benchId }) => benchId))];
  const readingIds = recordings.map(({ currentReadingId }) => currentReadingId).filter((id) => id !== null);
  const [reviews, seriesNames] = await Promise.all([
    Review.listNewestByReadings(benchIds, readingIds),
    ReadingSeries.listNamesByReadings(benchIds, readingIds),
  ]);
  return recordings.map((recording) => {
    const readingId = recording.currentReadingId ?? '';
    return { recording, review: reviews.get(readingId) ?? null, seriesNames: seriesNames.get(readingId) ?? [] };
  });
}
