import { defineEndpoint } from '#http/defineEndpoint.ts';
import { metricsRegistry } from '#server/metrics.ts';

export const GET = defineEndpoint({
  call: 'GET /metrics',
  handle: async () =>
    new Response(await metricsRegistry.metrics(), { headers: { 'content-type': metricsRegistry.contentType } }),
});
