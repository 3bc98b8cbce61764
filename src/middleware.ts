import { sequence } from 'astro:middleware';
import { access } from '#http/middleware/access.ts';
import { actor } from '#http/middleware/actor.ts';
import { crossSite } from '#http/middleware/crossSite.ts';
import { observe } from '#http/middleware/observe.ts';
import { problems } from '#http/middleware/problems.ts';
import { securityHeaders } from '#http/middleware/securityHeaders.ts';
import { theme } from '#http/middleware/theme.ts';

/** Outermost first. What one of them throws is answered by `problems`, and every answer gets the headers. */
export const onRequest = sequence(observe, securityHeaders, problems, theme, crossSite, actor, access);
