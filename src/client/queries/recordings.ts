import { infiniteQueryOptions, mutationOptions, queryOptions, type QueryClient } from '@tanstack/react-query';
import { request } from '#client/api/request.ts';
import { pageOf } from '#lib/schemas/page.ts';
import { recordingView, type RecordingStatus, type UpdateRecordingRequest } from '#lib/schemas/recording.ts';

export interface RecordingFilter {
  readonly benchId?: string;
  readonly sessionId?: string;
  readonly buildId?: string;
  readonly status?: RecordingStatus;
  readonly needsPerson?: boolean;
}

/** Everything cached about recordings begins with these keys; useUpdates marks them stale by them. */
export const recordingKeys = {
  all: ['recordings'] as const,
  lists: ['recordings', 'list'] as const,
  one: (recordingId: string) => ['recordings', 'one', recordingId] as const,
};

/** One recording with its current reading. */
export const recordingQuery = (recordingId: string) =>
  queryOptions({
    queryKey: recordingKeys.one(recordingId),
    queryFn: ({ signal }) => request({ path: `/recordings/${recordingId}`, schema: recordingView, signal }),
  });

/** Recordings page by page, newest first. */
export const recordingsQuery = (filter: RecordingFilter) =>
  infiniteQueryOptions({
    queryKey: [...recordingKeys.lists, filter] as const,
    queryFn: ({ pageParam, signal }) =>
      request({
        path: '/recordings',
        search: { ...filter, cursor: pageParam },
        schema: pageOf(recordingView),
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (lastPage) => lastPage.nextCursor,
  });

/** Changes the conditions of a recording; null clears a value. */
export const updateRecordingMutation = (queryClient: QueryClient, recordingId: string) =>
  mutationOptions({
    mutationFn: (changes: UpdateRecordingRequest) =>
      request({ path: `/recordings/${recordingId}`, method: 'PATCH', body: changes, schema: recordingView }),
    onSuccess: (recording) => {
      queryClient.setQueryData(recordingQuery(recordingId).queryKey, recording);
      void queryClient.invalidateQueries({ queryKey: recordingKeys.lists });
    },
  });
