import { afterEach, describe, expect, it, vi } from 'vitest';
import * as z from 'zod/mini';
import { ApiError } from '#client/api/ApiError.ts';
import { request } from '#client/api/request.ts';

const speed = z.object({ rpm: z.number() });

/** Stands in for the network only; an answer is a real Response. */
function answerWith(answer: () => Promise<Response>) {
  const fetchStub = vi.fn<typeof fetch>(answer);
  vi.stubGlobal('fetch', fetchStub);
  return fetchStub;
}

const json = (status: number, body: unknown) =>
  answerWith(() => Promise.resolve(new Response(JSON.stringify(body), { status })));

async function refusalOf(call: Promise<unknown>): Promise<ApiError> {
  const error: unknown = await call.then(
    () => null,
    (reason: unknown) => reason,
  );
  if (!(error instanceof ApiError)) throw new Error(`expected an ApiError, got ${String(error)}`);
  return error;
}

afterEach(() => {
  vi.unstubAllGlobals();
});

describe('request', () => {
  it('asks below the base path and leaves out null and undefined search values', async () => {
    const fetchStub = json(200, { rpm: 2874 });
    await request({ path: '/x', search: { a: 1, b: null, c: undefined, d: 'ä &' }, schema: speed });
    expect(fetchStub.mock.calls[0]?.[0]).toBe('/api/v1/x?a=1&d=%C3%A4+%26');
  });

  it('sends a body as JSON and nothing about content without one', async () => {
    const fetchStub = json(200, { rpm: 2874 });
    await request({ path: '/x', method: 'POST', body: { rpm: 1 }, schema: speed });
    await request({ path: '/x', schema: speed });
    expect(fetchStub.mock.calls[0]?.[1]).toMatchObject({ method: 'POST', body: '{"rpm":1}' });
    expect(fetchStub.mock.calls[0]?.[1]?.headers).toHaveProperty('content-type', 'application/json');
    expect(fetchStub.mock.calls[1]?.[1]?.headers).not.toHaveProperty('content-type');
  });

  it('gives the checked body without members that this page does not know', async () => {
    json(200, { rpm: 2874, madeLater: true });
    await expect(request({ path: '/x', schema: speed })).resolves.toEqual({ rpm: 2874 });
  });

  it('turns a problem body into code, words and field messages', async () => {
    json(422, {
      type: 'about:blank',
      title: 'Some fields are not valid',
      status: 422,
      code: 'invalid-fields',
      detail: 'One field is not valid.',
      requestId: 'r-1',
      errors: [{ field: 'supplyVolts', message: 'Must be a number from 0 to 1000 V.' }],
    });
    const error = await refusalOf(request({ path: '/x', schema: speed }));
    expect(error).toMatchObject({ code: 'invalid-fields', status: 422, requestId: 'r-1', isTransient: false });
    expect(error.detail).toBe('One field is not valid.');
    expect(error.fieldErrors).toEqual({ supplyVolts: 'Must be a number from 0 to 1000 V.' });
  });

  it.each([
    ['a gateway page', 502, '<html>Bad gateway</html>', true],
    ['a JSON body that is no problem', 404, '{"error":"gone"}', false],
    ['an empty body', 500, '', true],
  ])('keeps the status of %s', async (_, status, body, isTransient) => {
    answerWith(() => Promise.resolve(new Response(body, { status })));
    const error = await refusalOf(request({ path: '/x', schema: speed }));
    expect(error).toMatchObject({ code: 'unexpected-answer', status, isTransient });
  });

  it('refuses a 200 of another shape instead of passing it on', async () => {
    json(200, { rpm: 'fast' });
    const error = await refusalOf(request({ path: '/x', schema: speed }));
    expect(error).toMatchObject({ code: 'unexpected-answer', isTransient: false });
  });

  it('calls a missing network unreachable', async () => {
    answerWith(() => Promise.reject(new TypeError('Failed to fetch')));
    const error = await refusalOf(request({ path: '/x', schema: speed }));
    expect(error).toMatchObject({ code: 'unreachable', status: 0, isTransient: true });
  });

  it('lets an abort through as an abort', async () => {
    answerWith(() => Promise.reject(new DOMException('aborted', 'AbortError')));
    const call = request({ path: '/x', schema: speed, signal: AbortSignal.abort() });
    await expect(call).rejects.toHaveProperty('name', 'AbortError');
  });
});
