import { type Ability, canInBench } from './abilities.ts';
import type { Actor } from './actor.ts';

/**
 * Who may make which call. The middleware refuses every call that is not listed here, and a test compares this table
 * with the routes of the sources both ways. What a person may do with one record of one bench is decided again,
 * where the record is loaded, by the policy of its model.
 */
export interface Rule {
  /**
   * `probe`: anyone, and who asks is never looked up, so that it answers while the database is away;
   * `anyone`; `account`: a signed-in person or a token; `worker`: a job, never a request.
   */
  readonly audience: 'probe' | 'anyone' | 'account' | 'worker';
  /** A read token may only make `read` calls. */
  readonly access: 'read' | 'write';
  /** What the asker must be able to do in at least one bench before anything is loaded. */
  readonly ability?: Ability;
}

const PROBE = { audience: 'probe', access: 'read' } as const satisfies Rule;
const ANYONE_READS = {
  audience: 'anyone',
  access: 'read',
} as const satisfies Rule;
const ANYONE_WRITES = {
  audience: 'anyone',
  access: 'write',
} as const satisfies Rule;
const ACCOUNT_READS = {
  audience: 'account',
  access: 'read',
} as const satisfies Rule;
const CONTRIBUTES = {
  audience: 'account',
  access: 'write',
  ability: 'contribute',
} as const satisfies Rule;
const WORKER = { audience: 'worker', access: 'write' } as const satisfies Rule;

export const POLICY_TABLE = {
  'GET /healthz': PROBE,
  'GET /readyz': PROBE,
  'GET /metrics': PROBE,

  'GET /': ACCOUNT_READS,
  'GET /sign-in': ANYONE_READS,
  'POST /sign-in': ANYONE_WRITES,
  'GET /set-password/[token]': ANYONE_READS,
  'POST /set-password/[token]': ANYONE_WRITES,
  'GET /sessions': ACCOUNT_READS,
  'GET /sessions/new': ACCOUNT_READS,
  'GET /sessions/[id]': ACCOUNT_READS,
  'GET /recordings/[id]': ACCOUNT_READS,
  'GET /builds': ACCOUNT_READS,
  'GET /builds/new': ACCOUNT_READS,
  'GET /builds/[id]': ACCOUNT_READS,

  'GET /api/v1/openapi.json': PROBE,
  'POST /api/v1/sign-in': ANYONE_WRITES,
  'POST /api/v1/sign-out': ANYONE_WRITES,
  'GET /api/v1/me': ACCOUNT_READS,
  'GET /api/v1/builds': ACCOUNT_READS,
  'POST /api/v1/builds': CONTRIBUTES,
  'GET /api/v1/builds/[id]': ACCOUNT_READS,
  'PATCH /api/v1/builds/[id]': CONTRIBUTES,
  'GET /api/v1/sessions': ACCOUNT_READS,
  'POST /api/v1/sessions': CONTRIBUTES,
  'GET /api/v1/sessions/[id]': ACCOUNT_READS,
  'PATCH /api/v1/sessions/[id]': CONTRIBUTES,
  'GET /api/v1/sessions/[id]/result': ACCOUNT_READS,
  'GET /api/v1/recordings': ACCOUNT_READS,
  'POST /api/v1/recordings': CONTRIBUTES,
  'GET /api/v1/recordings/[id]': ACCOUNT_READS,
  'PATCH /api/v1/recordings/[id]': CONTRIBUTES,
  'GET /api/v1/recordings/[id]/readings': ACCOUNT_READS,
  'POST /api/v1/recordings/[id]/readings': CONTRIBUTES,
  'GET /api/v1/recordings/[id]/playback': ACCOUNT_READS,
  'GET /api/v1/recordings/[id]/original': ACCOUNT_READS,
  'POST /api/v1/readings/[id]/reviews': CONTRIBUTES,
  'GET /api/v1/readings/[id]/series/[name]': ACCOUNT_READS,
  'GET /api/v1/updates': ACCOUNT_READS,

  'JOB analyseRecording': WORKER,
} as const satisfies Record<string, Rule>;

export type Call = keyof typeof POLICY_TABLE;

export function ruleOf(call: string): Rule | undefined {
  return Object.hasOwn(POLICY_TABLE, call) ? POLICY_TABLE[call as Call] : undefined;
}

/** The methods that a route answers to, for the Allow header. */
export function methodsOf(route: string): string[] {
  return Object.keys(POLICY_TABLE)
    .map((call) => call.split(' '))
    .filter(([, path]) => path === route)
    .map(([method]) => method ?? '');
}

export type AccessDecision = 'allowed' | 'not-signed-in' | 'forbidden';

export function decideAccess(rule: Rule, actor: Actor | null): AccessDecision {
  if (rule.audience === 'worker') return 'forbidden';
  if (rule.audience !== 'account') return 'allowed';
  if (actor === null) return 'not-signed-in';
  if (rule.access === 'write' && actor.access === 'read') return 'forbidden';
  const { ability } = rule;
  if (ability === undefined) return 'allowed';
  return actor.memberships.some(({ benchId }) => canInBench(actor, benchId, ability)) ? 'allowed' : 'forbidden';
}
