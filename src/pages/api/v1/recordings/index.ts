import { acceptUpload } from '#http/acceptUpload.ts';
import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { presentUpload } from '#server/presenters/presentUpload.ts';

export const POST = defineEndpoint({
  call: 'POST /api/v1/recordings',
  handle: async ({ context, actor }) => {
    const { recording, created } = await acceptUpload(context, actor);
    return json(presentUpload(recording), {
      status: created ? 201 : 200,
      location: `/api/v1/recordings/${recording.id}`,
    });
  },
});
