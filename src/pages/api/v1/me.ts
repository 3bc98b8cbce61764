import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { presentMe } from '#server/presenters/presentMe.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/me',
  handle: ({ actor }) => json(presentMe(actor)),
});
