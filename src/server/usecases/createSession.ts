import type { CreateSessionRequest } from '#lib/schemas/session.ts';
import { inTransaction } from '../database/inTransaction.ts';
import { Session } from '../models/Session.ts';
import type { Actor } from '../policies/actor.ts';
import { audit } from './audit.ts';
import { benchToWriteIn } from './benchChoice.ts';
import { getSession, type SessionDetails } from './getSession.ts';
import { conditionColumns, refuseForeignBuild } from './sessionFields.ts';

interface CreateSession {
  readonly actor: Actor;
  readonly request: CreateSessionRequest;
}

/** @throws ServerError invalid-fields, forbidden, not-found (bench) */
export async function createSession({ actor, request }: CreateSession): Promise<SessionDetails> {
  const benchId = benchToWriteIn(actor, request.benchId, 'contribute');
  const { title, purpose, buildId = null, conditions } = request;
  await refuseForeignBuild(buildId, benchId);
  const columns = { benchId, title, purpose, buildId, ...conditionColumns(conditions), createdBy: actor.account.id };
  const sessionId = await inTransaction(async (transaction) => {
    const { id } = await Session.create(columns, { transaction });
    const object = { type: 'session', id };
    await audit({ action: 'session.created', accountId: actor.account.id, benchId, object }, transaction);
    return id;
  });
  return getSession({ actor, sessionId });
}
