import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';

/** The process answers; it looks at nothing else, so that a lost database restarts nobody. */
export const GET = defineEndpoint({ call: 'GET /healthz', handle: () => json({ status: 'live' }) });
