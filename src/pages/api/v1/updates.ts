import { defineEndpoint } from '#http/defineEndpoint.ts';
import { updatesStream } from '#http/updatesStream.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/updates',
  handle: async ({ context, actor }) =>
    new Response(await updatesStream(context, actor), {
      // The last one tells a proxy not to collect the stream before it passes it on.
      headers: { 'content-type': 'text/event-stream', 'cache-control': 'no-store', 'x-accel-buffering': 'no' },
    }),
});
