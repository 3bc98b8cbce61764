import { attachment } from '#http/attachment.ts';
import { blobResponse } from '#http/blobResponse.ts';
import { defineEndpoint } from '#http/defineEndpoint.ts';
import { openOriginal } from '#server/usecases/openOriginal.ts';

/** To save, never to show: nothing in a stranger's file runs or renders under this address. */
export const GET = defineEndpoint({
  call: 'GET /api/v1/recordings/[id]/original',
  handle: async ({ context, actor, parameter }) => {
    const { blob, fileName, sha256 } = await openOriginal({ actor, recordingId: parameter('id') });
    const headers = { 'content-disposition': attachment(fileName) };
    return blobResponse(context, { blob, sha256, contentType: 'application/octet-stream', headers });
  },
});
