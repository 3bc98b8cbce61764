import { clearAuthCookie } from '#http/authCookie.ts';
import { defineEndpoint } from '#http/defineEndpoint.ts';
import { signOut } from '#server/usecases/signOut.ts';

export const POST = defineEndpoint({
  call: 'POST /api/v1/sign-out',
  handle: async ({ context, actor }) => {
    await signOut({ actor, authSessionId: context.locals.authSession?.id ?? null });
    clearAuthCookie(context.cookies);
    // The form of a page without script wants to be led on.
    const isFormOfPage = context.request.headers.get('accept')?.includes('text/html') ?? false;
    return isFormOfPage ? context.redirect('/sign-in', 303) : new Response(null, { status: 204 });
  },
});
