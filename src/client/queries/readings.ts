import { mutationOptions, queryOptions, type QueryClient } from '@tanstack/react-query';
import * as z from 'zod/mini';
import { request } from '#client/api/request.ts';
import type { SeriesName } from '#lib/analysis/series.ts';
import { pageOf } from '#lib/schemas/page.ts';
import {
  readingView,
  reviewView,
  seriesView,
  type AnalyseAgainRequest,
  type ReviewRequest,
} from '#lib/schemas/reading.ts';
import { recordingKeys } from './recordings.ts';

export const readingKeys = {
  all: ['readings'] as const,
  ofRecording: (recordingId: string) => ['readings', 'of', recordingId] as const,
};

/** One series of a reading. A reading never changes, so its series are fetched once. */
export const seriesQuery = (readingId: string, name: SeriesName) =>
  queryOptions({
    queryKey: ['series', readingId, name] as const,
    queryFn: ({ signal }) => request({ path: `/readings/${readingId}/series/${name}`, schema: seriesView, signal }),
    staleTime: 'static',
  });

/** All readings of a recording, newest first. */
export const readingsQuery = (recordingId: string) =>
  queryOptions({
    queryKey: readingKeys.ofRecording(recordingId),
    queryFn: ({ signal }) =>
      request({ path: `/recordings/${recordingId}/readings`, schema: pageOf(readingView), signal }),
  });

/** A person confirms a reading, picks another speed, or discards it. */
export const reviewReadingMutation = (queryClient: QueryClient, recordingId: string, readingId: string) =>
  mutationOptions({
    mutationFn: (review: ReviewRequest) =>
      request({ path: `/readings/${readingId}/reviews`, method: 'POST', body: review, schema: reviewView }),
    onSettled: () => invalidateRecording(queryClient, recordingId),
  });

/** The answer says no more than that the work is accepted; the reading arrives over the updates. */
const analysisAccepted = z.unknown();

/** Analyses a recording again with other settings. */
export const analyseAgainMutation = (queryClient: QueryClient, recordingId: string) =>
  mutationOptions({
    mutationFn: (settings: AnalyseAgainRequest) =>
      request({
        path: `/recordings/${recordingId}/readings`,
        method: 'POST',
        body: settings,
        schema: analysisAccepted,
      }),
    onSettled: () => invalidateRecording(queryClient, recordingId),
  });

async function invalidateRecording(queryClient: QueryClient, recordingId: string): Promise<void> {
  await Promise.all([
    queryClient.invalidateQueries({ queryKey: recordingKeys.one(recordingId) }),
    queryClient.invalidateQueries({ queryKey: recordingKeys.lists }),
    queryClient.invalidateQueries({ queryKey: readingKeys.ofRecording(recordingId) }),
  ]);
}
