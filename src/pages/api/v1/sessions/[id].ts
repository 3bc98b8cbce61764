import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { updateSessionRequest } from '#lib/schemas/session.ts';
import { presentSession } from '#server/presenters/presentSession.ts';
import { getSession } from '#server/usecases/getSession.ts';
import { updateSession } from '#server/usecases/updateSession.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/sessions/[id]',
  handle: async ({ actor, parameter }) =>
    json(presentSession(await getSession({ actor, sessionId: parameter('id') }), actor)),
});

export const PATCH = defineEndpoint({
  call: 'PATCH /api/v1/sessions/[id]',
  body: updateSessionRequest,
  handle: async ({ actor, parameter, body }) =>
    json(presentSession(await updateSession({ actor, sessionId: parameter('id'), changes: body }), actor)),
});
