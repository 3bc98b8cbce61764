import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { listOfBenchQuery } from '#lib/schemas/queries.ts';
import { createSessionRequest } from '#lib/schemas/session.ts';
import { presentSession } from '#server/presenters/presentSession.ts';
import { createSession } from '#server/usecases/createSession.ts';
import { listSessions } from '#server/usecases/listSessions.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/sessions',
  query: listOfBenchQuery,
  handle: async ({ actor, query }) => {
    const { items, nextCursor } = await listSessions({ actor, ...query });
    return json({ items: items.map((details) => presentSession(details, actor)), nextCursor });
  },
});

export const POST = defineEndpoint({
  call: 'POST /api/v1/sessions',
  body: createSessionRequest,
  handle: async ({ actor, body }) => {
    const session = presentSession(await createSession({ actor, request: body }), actor);
    return json(session, { status: 201, location: `/api/v1/sessions/${session.id}` });
  },
});
