import type { MiddlewareHandler } from 'astro';

/** The theme that the page was left in; written by a script of the page, so anything may stand there. */
export const theme: MiddlewareHandler = (context, next) => {
  const chosen = context.cookies.get('theme')?.value;
  context.locals.theme = chosen === 'light' || chosen === 'dark' ? chosen : 'system';
  return next();
};
