import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { updateBuildRequest } from '#lib/schemas/build.ts';
import { presentBuild } from '#server/presenters/presentBuild.ts';
import { getBuild } from '#server/usecases/getBuild.ts';
import { updateBuild } from '#server/usecases/updateBuild.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/builds/[id]',
  handle: async ({ actor, parameter }) =>
    json(presentBuild(await getBuild({ actor, buildId: parameter('id') }), actor)),
});

export const PATCH = defineEndpoint({
  call: 'PATCH /api/v1/builds/[id]',
  body: updateBuildRequest,
  handle: async ({ actor, parameter, body }) =>
    json(presentBuild(await updateBuild({ actor, buildId: parameter('id'), changes: body }), actor)),
});
