import type { APIContext, MiddlewareHandler } from 'astro';
import { forbidden, notFound, ServerError } from '#server/errors.ts';
import { decideAccess, methodsOf, ruleOf } from '#server/policies/policyTable.ts';
import { errorResponse } from '../errorResponse.ts';
import { isCallOfApi } from '../isCallOfApi.ts';
import { requireActor } from '../requireActor.ts';

/** What Astro runs when nothing else fits; they show no record. */
const ERROR_ROUTES: readonly string[] = ['/404', '/500'];

/** Refuses every call that the policy table does not allow; a call that it does not name is refused to everyone. */
export const access: MiddlewareHandler = (context, next) => {
  const { routePattern, locals, request } = context;
  if (ERROR_ROUTES.includes(routePattern)) return next();
  const rule = ruleOf(callOf(context));
  if (rule === undefined) return refuseUnlisted(context);
  const decision = decideAccess(rule, locals.actor);
  if (decision === 'allowed') return next();
  if (decision === 'forbidden') throw forbidden();
  if (isCallOfApi(context) || request.method !== 'GET') requireActor(context);
  return context.redirect(`/sign-in?next=${encodeURIComponent(context.url.pathname + context.url.search)}`, 303);
};

export function callOf({ request, routePattern }: APIContext): string {
  return `${request.method === 'HEAD' ? 'GET' : request.method} ${routePattern}`;
}

function refuseUnlisted(context: APIContext): Response {
  const methods = methodsOf(context.routePattern);
  if (context.routePattern === '/api/[...path]') throw notFound('address');
  if (methods.length === 0) throw forbidden();
  const detail = `This address answers ${methods.join(' and ')}.`;
  const response = errorResponse(new ServerError({ code: 'method-not-allowed', detail }), context.locals.requestId);
  response.headers.set('allow', methods.join(', '));
  return response;
}
