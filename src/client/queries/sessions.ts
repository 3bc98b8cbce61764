import { mutationOptions, queryOptions, type QueryClient } from '@tanstack/react-query';
import { request } from '#client/api/request.ts';
import {
  sessionResultView,
  sessionView,
  type CreateSessionRequest,
  type UpdateSessionRequest,
} from '#lib/schemas/session.ts';

export const sessionKeys = {
  all: ['sessions'] as const,
  lists: ['sessions', 'list'] as const,
  one: (sessionId: string) => ['sessions', 'one', sessionId] as const,
};

export const sessionQuery = (sessionId: string) =>
  queryOptions({
    queryKey: sessionKeys.one(sessionId),
    queryFn: ({ signal }) => request({ path: `/sessions/${sessionId}`, schema: sessionView, signal }),
  });

/** What the session's recordings say together. Below the session's key: whatever makes one stale makes both. */
export const sessionResultQuery = (sessionId: string) =>
  queryOptions({
    queryKey: [...sessionKeys.one(sessionId), 'result'] as const,
    queryFn: ({ signal }) => request({ path: `/sessions/${sessionId}/result`, schema: sessionResultView, signal }),
  });

export const createSessionMutation = (queryClient: QueryClient) =>
  mutationOptions({
    mutationFn: (session: CreateSessionRequest) =>
      request({ path: '/sessions', method: 'POST', body: session, schema: sessionView }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: sessionKeys.lists }),
  });

export const updateSessionMutation = (queryClient: QueryClient, sessionId: string) =>
  mutationOptions({
    mutationFn: (changes: UpdateSessionRequest) =>
      request({ path: `/sessions/${sessionId}`, method: 'PATCH', body: changes, schema: sessionView }),
    onSuccess: (session) => {
      queryClient.setQueryData(sessionQuery(sessionId).queryKey, session);
      void queryClient.invalidateQueries({ queryKey: sessionKeys.all });
    },
  });
