import type { APIContext } from 'astro';
import type { SignInRequest } from '#lib/schemas/account.ts';
import { signIn } from '#server/usecases/signIn.ts';
import { setAuthCookie } from './authCookie.ts';

/**
 * Signs in whoever asks and sets the cookie, for the endpoint and for the form of the page.
 *
 * @throws ServerError wrong-credentials, too-many-requests
 */
export async function signInFrom(
  context: Pick<APIContext, 'clientAddress' | 'cookies' | 'locals'>,
  credentials: SignInRequest,
): Promise<void> {
  const { authSessionId } = await signIn({
    ...credentials,
    address: context.clientAddress,
    previousAuthSessionId: context.locals.authSession?.id ?? null,
  });
  setAuthCookie(context.cookies, authSessionId);
}
