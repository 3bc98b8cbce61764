import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { analyseAgainRequest } from '#lib/schemas/reading.ts';
import { presentReading } from '#server/presenters/presentReading.ts';
import { presentRecording } from '#server/presenters/presentRecording.ts';
import { analyseAgain } from '#server/usecases/analyseAgain.ts';
import { listReadings } from '#server/usecases/listReadings.ts';

/** A recording has few readings: one page holds them all. */
export const GET = defineEndpoint({
  call: 'GET /api/v1/recordings/[id]/readings',
  handle: async ({ actor, parameter }) => {
    const readings = await listReadings({ actor, recordingId: parameter('id') });
    return json({ items: readings.map(presentReading), nextCursor: null });
  },
});

export const POST = defineEndpoint({
  call: 'POST /api/v1/recordings/[id]/readings',
  body: analyseAgainRequest,
  handle: async ({ actor, parameter, body }) => {
    const recordingId = parameter('id');
    const details = await analyseAgain({ actor, recordingId, request: body });
    return json(presentRecording(details, actor), { status: 202, location: `/api/v1/recordings/${recordingId}` });
  },
});
