import { blobResponse } from '#http/blobResponse.ts';
import { defineEndpoint } from '#http/defineEndpoint.ts';
import { openPlayback } from '#server/usecases/openPlayback.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/recordings/[id]/playback',
  handle: async ({ context, actor, parameter }) => {
    const { blob, mediaType, sha256 } = await openPlayback({ actor, recordingId: parameter('id') });
    return blobResponse(context, { blob, sha256, contentType: mediaType });
  },
});
