import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { checkReadiness } from '#server/usecases/checkReadiness.ts';

export const GET = defineEndpoint({
  call: 'GET /readyz',
  handle: async () => {
    const readiness = await checkReadiness();
    return json(readiness, { status: readiness.status === 'not-ready' ? 503 : 200 });
  },
});
