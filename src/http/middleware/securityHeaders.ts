import type { MiddlewareHandler } from 'astro';
import { settings } from '#server/env.ts';

/**
 * Stand beside the policy of astro.config.mjs, which has no words for them or writes its own hashes there.
 * `style-src-attr` lets charts and progress bars set their size; scripts have no such exception.
 */
const PAGE_CSP_ADDITIONS = [
  "style-src-attr 'unsafe-inline'",
  "object-src 'none'",
  "base-uri 'self'",
  "frame-ancestors 'none'",
].join('; ');

/** Nothing that a call answers is a document. */
const CALL_CSP = "default-src 'none'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'; sandbox";

const HSTS = 'max-age=63072000; includeSubDomains';

export const securityHeaders: MiddlewareHandler = async (_context, next) => {
  const response = await next();
  const { headers } = response;
  const isPage = headers.get('content-type')?.startsWith('text/html') ?? false;
  headers.set('content-security-policy', isPage ? pagePolicy(headers.get('content-security-policy')) : CALL_CSP);
  headers.set('x-content-type-options', 'nosniff');
  headers.set('x-frame-options', 'DENY');
  if (!headers.has('referrer-policy')) headers.set('referrer-policy', 'same-origin');
  headers.set('cross-origin-opener-policy', 'same-origin');
  headers.set('cross-origin-resource-policy', 'same-origin');
  headers.set('permissions-policy', 'camera=(self), microphone=(self), geolocation=(), payment=(), usb=()');
  // Pages and answers hold what only one person may see; files of the build are served in front of this.
  if (!headers.has('cache-control')) headers.set('cache-control', 'private, no-store');
  if (settings().publicUrl.startsWith('https:')) headers.set('strict-transport-security', HSTS);
  return response;
};

function pagePolicy(policyOfAstro: string | null): string {
  const ownPolicy = policyOfAstro?.replace(/;\s*$/, '') ?? "default-src 'self'";
  return `${ownPolicy}; ${PAGE_CSP_ADDITIONS}`;
}
