import type { APIContext } from 'astro';
import { problemOf } from './errorResponse.ts';

const NOT_FOUND_STATUS = 404;

/**
 * The page that tells what went wrong. Astro draws 404.astro and 500.astro for an empty answer with that status;
 * both find the problem in `Astro.locals.problem`.
 */
export function errorPage(error: unknown, { locals }: APIContext): Response {
  const { problem } = problemOf(error, locals.requestId);
  locals.problem = problem;
  return new Response(null, {
    status: problem.status === NOT_FOUND_STATUS ? NOT_FOUND_STATUS : 500,
  });
}
