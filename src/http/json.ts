/** A JSON answer; `location` is where a new record lives. */
export function json(body: unknown, options: { status?: number; location?: string } = {}): Response {
  const { status = 200, location } = options;
  const headers = new Headers({ 'content-type': 'application/json' });
  if (location !== undefined) headers.set('location', location);
  return new Response(JSON.stringify(body), { status, headers });
}
