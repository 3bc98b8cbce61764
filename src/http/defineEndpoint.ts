import type { APIContext, APIRoute } from 'astro';
import type * as z from 'zod/mini';
import { identifier } from '#lib/schemas/fields.ts';
import { type FieldError, invalidFields, notFound } from '#server/errors.ts';
import type { Actor } from '#server/policies/actor.ts';
import { type Call, POLICY_TABLE } from '#server/policies/policyTable.ts';
import { parseFields } from './parseFields.ts';
import { readJsonBody } from './readJsonBody.ts';
import { requireActor } from './requireActor.ts';

/** Calls that only people with an account make get an actor; the others get null when nobody is signed in. */
type ActorOf<C extends Call> = (typeof POLICY_TABLE)[C] extends {
  audience: 'account';
}
  ? Actor
  : Actor | null;

interface EndpointDefinition<C extends Call, Query extends z.ZodMiniType, Body extends z.ZodMiniType> {
  /** The line of the policy table; the middleware has applied its rule before the handler runs. */
  readonly call: C;
  /** Strict: a parameter that it does not name is refused. Without it, every parameter is. */
  readonly query?: Query;
  /** Of the JSON body; strict as well. Without it the body is left alone, for the handler to stream or ignore. */
  readonly body?: Body;
  readonly handle: (request: {
    readonly context: APIContext;
    readonly actor: ActorOf<C>;
    readonly query: z.infer<Query>;
    readonly body: z.infer<Body>;
    /** A parameter of the path. */
    readonly parameter: (name: string) => string;
  }) => Promise<Response> | Response;
}

/**
 * One method of one URL. What it throws becomes a problem body in the middleware, so that handlers hold nothing but
 * the way from a checked request through one use case and one presenter to the answer.
 *
 * @throws ServerError invalid-fields, unsupported-media-type, too-large, bad-request, not-found, or what `handle` throws.
 */
export function defineEndpoint<
  C extends Call,
  Query extends z.ZodMiniType = z.ZodMiniType<Record<string, never>>,
  Body extends z.ZodMiniType = z.ZodMiniType<undefined>,
>(definition: EndpointDefinition<C, Query, Body>): APIRoute {
  return async (context) => {
    refuseMisplaced(definition.call, context);
    const { audience } = POLICY_TABLE[definition.call];
    const actor = audience === 'account' ? requireActor(context) : context.locals.actor;
    refuseMalformedIds(context);
    const query = readQuery(context.url.searchParams, definition.query);
    const body = definition.body === undefined ? undefined : await readBody(context.request, definition.body);
    return definition.handle({
      context,
      actor: actor as ActorOf<C>,
      query: query as z.infer<Query>,
      body: body as z.infer<Body>,
      parameter: (name) => context.params[name] ?? '',
    });
  };
}

/** A rule that stands beside another route would protect the wrong door. */
function refuseMisplaced(call: Call, { request, routePattern }: APIContext): void {
  const method = request.method === 'HEAD' ? 'GET' : request.method;
  if (`${method} ${routePattern}` === call) return;
  throw new Error(`defineEndpoint: ${call} answers ${method} ${routePattern}; every method needs a line of its own`);
}

/** An identifier that cannot exist is answered like one that does not. */
function refuseMalformedIds({ params }: APIContext): void {
  if (params.id !== undefined && !identifier.safeParse(params.id).success) throw notFound('record');
}

function readQuery(search: URLSearchParams, schema: z.ZodMiniType | undefined): unknown {
  const names = [...new Set(search.keys())];
  const wrong: FieldError[] = names
    .filter((name) => schema === undefined || search.getAll(name).length > 1)
    .map((field) => ({
      field,
      message: schema === undefined ? 'Is not a parameter of this call.' : 'Must be given once.',
    }));
  if (wrong.length > 0) throw invalidFields(wrong);
  return schema === undefined ? {} : parseFields(schema, Object.fromEntries(search));
}

async function readBody<Body extends z.ZodMiniType>(request: Request, schema: Body): Promise<z.infer<Body>> {
  return parseFields(schema, await readJsonBody(request));
}
