import { useMutation, useQueryClient } from '@tanstack/react-query';
import { reviewReadingMutation } from '#client/queries/readings.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';

/** Saying something about the current reading of a recording. */
export function useReview(recording: RecordingView) {
  const queryClient = useQueryClient();
  return useMutation(reviewReadingMutation(queryClient, recording.id, recording.reading?.id ?? ''));
}

/** Where another recording of the same thing is made. */
export function recordAgainHref({ sessionId }: RecordingView): string {
  return sessionId === null ? '/#record' : `/sessions/${sessionId}#record`;
}
