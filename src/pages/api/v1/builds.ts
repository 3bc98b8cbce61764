import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { createBuildRequest } from '#lib/schemas/build.ts';
import { listOfBenchQuery } from '#lib/schemas/queries.ts';
import { presentBuild } from '#server/presenters/presentBuild.ts';
import { createBuild } from '#server/usecases/createBuild.ts';
import { listBuilds } from '#server/usecases/listBuilds.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/builds',
  query: listOfBenchQuery,
  handle: async ({ actor, query }) => {
    const { items, nextCursor } = await listBuilds({ actor, ...query });
    return json({ items: items.map((details) => presentBuild(details, actor)), nextCursor });
  },
});

export const POST = defineEndpoint({
  call: 'POST /api/v1/builds',
  body: createBuildRequest,
  handle: async ({ actor, body }) => {
    const build = presentBuild(await createBuild({ actor, request: body }), actor);
    return json(build, { status: 201, location: `/api/v1/builds/${build.id}` });
  },
});
