import { queryOptions } from '@tanstack/react-query';
import { request } from '#client/api/request.ts';
import { meView } from '#lib/schemas/account.ts';

/** The signed-in account with its benches and roles. */
export const meQuery = () =>
  queryOptions({
    queryKey: ['me'] as const,
    queryFn: ({ signal }) => request({ path: '/me', schema: meView, signal }),
  });
