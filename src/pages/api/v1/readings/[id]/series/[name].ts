import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { presentSeries } from '#server/presenters/presentSeries.ts';
import { getSeries } from '#server/usecases/getSeries.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/readings/[id]/series/[name]',
  handle: async ({ actor, parameter }) =>
    json(presentSeries(await getSeries({ actor, readingId: parameter('id'), name: parameter('name') }))),
});
