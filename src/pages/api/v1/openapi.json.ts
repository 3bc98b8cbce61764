import { defineEndpoint } from '#http/defineEndpoint.ts';
import { json } from '#http/json.ts';
import { openApiDocument } from '#http/openApi/openApiDocument.ts';

export const GET = defineEndpoint({
  call: 'GET /api/v1/openapi.json',
  handle: () => json(openApiDocument()),
});
