import type { APIContext, MiddlewareNext } from 'astro';
import { problemOf } from './errorResponse.ts';

const NOT_FOUND_STATUS = 404;

/**
 * The page that tells what went wrong: 404.astro or 500.astro, which find the problem in `Astro.locals.problem`.
 * The answer keeps the status of the problem, e.g. 503 while the database is away.
 *
 * @param next of the middleware that caught the error; it is called again, with the error page as its goal.
 */
export async function errorPage(error: unknown, context: APIContext, next: MiddlewareNext): Promise<Response> {
  const { problem, retryAfterSeconds } = problemOf(error, context.locals.requestId);
  context.locals.problem = problem;
  const path = problem.status === NOT_FOUND_STATUS ? '/404' : '/500';
  // A plain GET whatever was asked: the body of a form has been read, and reading a page changes nothing.
  const { body, headers } = await next(new Request(new URL(path, context.url)));
  if (retryAfterSeconds !== null) headers.set('retry-after', String(Math.ceil(retryAfterSeconds)));
  return new Response(body, { status: problem.status, headers });
}
