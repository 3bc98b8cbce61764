import type { APIContext, MiddlewareHandler } from 'astro';
import { ServerError } from '#server/errors.ts';
import { logger } from '#server/logger.ts';
import { audit } from '#server/usecases/audit.ts';
import { errorPage } from '../errorPage.ts';
import { errorResponse, reportError } from '../errorResponse.ts';
import { isCallOfApi } from '../isCallOfApi.ts';
import { callOf } from './access.ts';

const DENIALS: readonly string[] = ['forbidden', 'cross-site'];

/** Turns whatever was thrown into an answer: a problem body for programs, a page for people. */
export const problems: MiddlewareHandler = async (context, next) => {
  try {
    return await next();
  } catch (error) {
    await auditDenial(error, context);
    if (isCallOfApi(context)) return errorResponse(error, context.locals.requestId);
    reportError(error, context.locals.requestId);
    return errorPage(error, context, next);
  }
};

/** A refusal must not fail because the audit log is away. */
async function auditDenial(error: unknown, context: APIContext): Promise<void> {
  if (!(error instanceof ServerError) || !DENIALS.includes(error.code)) return;
  const accountId = context.locals.actor?.account.id ?? null;
  try {
    await audit({
      action: 'access.denied',
      accountId,
      details: { call: callOf(context), code: error.code },
    });
  } catch (cause) {
    logger().error({ err: cause }, 'a denied call could not be written to the audit log');
  }
}
