import { defineEndpoint } from '#http/defineEndpoint.ts';
import { signInFrom } from '#http/signInFrom.ts';
import { signInRequest } from '#lib/schemas/account.ts';

export const POST = defineEndpoint({
  call: 'POST /api/v1/sign-in',
  body: signInRequest,
  handle: async ({ context, body }) => {
    await signInFrom(context, body);
    return new Response(null, { status: 204 });
  },
});
