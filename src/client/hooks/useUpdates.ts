import { useQueryClient, type QueryClient, type QueryKey } from '@tanstack/react-query';
import { useEffect, useSyncExternalStore } from 'react';
import { readingKeys } from '#client/queries/readings.ts';
import { recordingKeys } from '#client/queries/recordings.ts';
import { sessionKeys } from '#client/queries/sessions.ts';
import { updatesStream, type StreamState } from '#client/updatesStream.ts';
import type { UpdateEvent } from '#lib/schemas/update.ts';

/**
 * Keeps this page's cache true: every update marks stale what it touches, a gap in the stream marks
 * everything stale. All islands of a page listen to one stream.
 *
 * @returns whether updates are arriving, so that the page can say when they are not
 */
export function useUpdates(): StreamState {
  const queryClient = useQueryClient();
  useEffect(
    () =>
      updatesStream.listen({
        onChange: (event) => {
          invalidateTouched(queryClient, event);
        },
        onGap: () => void queryClient.invalidateQueries(),
      }),
    [queryClient],
  );
  return useSyncExternalStore(
    subscribeToState,
    () => updatesStream.state,
    () => 'connecting',
  );
}

function subscribeToState(onState: () => void): () => void {
  return updatesStream.listen({ onState });
}

function invalidateTouched(queryClient: QueryClient, { recordingId, sessionId }: UpdateEvent): void {
  const keys: QueryKey[] = [recordingKeys.one(recordingId), recordingKeys.lists, readingKeys.ofRecording(recordingId)];
  if (sessionId !== null) keys.push(sessionKeys.one(sessionId));
  for (const queryKey of keys) void queryClient.invalidateQueries({ queryKey });
}
