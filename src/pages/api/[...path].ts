import type { APIRoute } from 'astro';
import { errorResponse } from '#http/errorResponse.ts';
import { notFound } from '#server/errors.ts';

/** Addresses below /api that no other file answers get a problem body instead of a page. */
export const ALL: APIRoute = ({ locals }) => errorResponse(notFound('address'), locals.requestId);
