import { acceptUpload } from '#http/acceptUpload.ts';
import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { listRecordingsQuery } from '#lib/schemas/queries.ts';
import { presentRecording } from '#server/presenters/presentRecording.ts';
import { presentUpload } from '#server/presenters/presentUpload.ts';
import { listRecordings } from '#server/usecases/listRecordings.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/recordings',
  query: listRecordingsQuery,
  handle: async ({ actor, query: { benchId, limit, cursor, ...filter } }) => {
    const { items, nextCursor } = await listRecordings({ actor, benchId, filter, limit, cursor });
    return json({ items: items.map((details) => presentRecording(details, actor)), nextCursor });
  },
});

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
