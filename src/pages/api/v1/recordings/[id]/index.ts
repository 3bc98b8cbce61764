import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { updateRecordingRequest } from '#lib/schemas/recording.ts';
import { presentRecording } from '#server/presenters/presentRecording.ts';
import { getRecording } from '#server/usecases/getRecording.ts';
import { updateRecording } from '#server/usecases/updateRecording.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/recordings/[id]',
  handle: async ({ actor, parameter }) =>
    json(presentRecording(await getRecording({ actor, recordingId: parameter('id') }), actor)),
});

export const PATCH = defineEndpoint({
  call: 'PATCH /api/v1/recordings/[id]',
  body: updateRecordingRequest,
  handle: async ({ actor, parameter, body }) =>
    json(presentRecording(await updateRecording({ actor, recordingId: parameter('id'), changes: body }), actor)),
});
