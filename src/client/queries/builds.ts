import { mutationOptions, queryOptions, type QueryClient } from '@tanstack/react-query';
import { request } from '#client/api/request.ts';
import { buildView, type CreateBuildRequest, type UpdateBuildRequest } from '#lib/schemas/build.ts';
import { pageOf } from '#lib/schemas/page.ts';

export const buildKeys = {
  all: ['builds'] as const,
  lists: ['builds', 'list'] as const,
  one: (buildId: string) => ['builds', 'one', buildId] as const,
};

export const buildQuery = (buildId: string) =>
  queryOptions({
    queryKey: buildKeys.one(buildId),
    queryFn: ({ signal }) => request({ path: `/builds/${buildId}`, schema: buildView, signal }),
  });

export const buildsQuery = (benchId: string) =>
  queryOptions({
    queryKey: [...buildKeys.lists, benchId] as const,
    queryFn: ({ signal }) => request({ path: '/builds', search: { benchId }, schema: pageOf(buildView), signal }),
  });

export const createBuildMutation = (queryClient: QueryClient) =>
  mutationOptions({
    mutationFn: (build: CreateBuildRequest) =>
      request({ path: '/builds', method: 'POST', body: build, schema: buildView }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: buildKeys.lists }),
  });

export const updateBuildMutation = (queryClient: QueryClient, buildId: string) =>
  mutationOptions({
    mutationFn: (changes: UpdateBuildRequest) =>
      request({ path: `/builds/${buildId}`, method: 'PATCH', body: changes, schema: buildView }),
    onSuccess: (build) => {
      queryClient.setQueryData(buildQuery(buildId).queryKey, build);
      void queryClient.invalidateQueries({ queryKey: buildKeys.lists });
    },
  });
