import type { MiddlewareHandler } from 'astro';
import { v4 as uuidV4 } from 'uuid';
import { clock } from '#server/clock.ts';
import { logger } from '#server/logger.ts';
import { countRequest } from '#server/metrics.ts';
import { requestContext } from '#server/requestContext.ts';

/** Names the request, times it, and leaves one log line. Neither holds a query string, an address or a name. */
export const observe: MiddlewareHandler = (context, next) => {
  // Astro runs the middleware again for its error pages; that is still the same request.
  const requestId = 'requestId' in context.locals ? context.locals.requestId : uuidV4();
  context.locals.requestId = requestId;
  return requestContext.run({ requestId }, async () => {
    // An error page has a route of its own; what was asked for is what counts.
    const { routePattern, request } = context;
    const startSeconds = clock.monotonicSeconds();
    const response = await next();
    response.headers.set('x-request-id', requestId);
    const line = { method: request.method, route: routePattern, status: response.status };
    record(line, requestId, clock.monotonicSeconds() - startSeconds);
    return response;
  });
};

function record(
  line: { method: string; route: string; status: number },
  requestId: string,
  elapsedSeconds: number,
): void {
  countRequest(line, elapsedSeconds);
  logger().debug({ ...line, elapsedSeconds, requestId }, 'request');
}
