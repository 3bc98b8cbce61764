import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { getSessionResult } from '#server/usecases/getSessionResult.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/sessions/[id]/result',
  handle: async ({ actor, parameter }) => json(await getSessionResult({ actor, sessionId: parameter('id') })),
});
