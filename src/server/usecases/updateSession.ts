import type { UpdateSessionRequest } from '#lib/schemas/session.ts';
import { inTransaction } from '../database/inTransaction.ts';
import { forbidden } from '../errors.ts';
import { Session } from '../models/Session.ts';
import type { Actor } from '../policies/actor.ts';
import { sessionPolicy } from '../policies/sessionPolicy.ts';
import { audit } from './audit.ts';
import { getSession, loadReadableSession, type SessionDetails } from './getSession.ts';
import { conditionColumns, refuseForeignBuild } from './sessionFields.ts';

interface UpdateSession {
  readonly actor: Actor;
  readonly sessionId: string;
  readonly changes: UpdateSessionRequest;
}

/** Changes what is named; conditions are replaced as a whole. @throws ServerError not-found, forbidden, invalid-fields */
export async function updateSession({ actor, sessionId, changes }: UpdateSession): Promise<SessionDetails> {
  const session = await loadReadableSession(actor, sessionId);
  if (!sessionPolicy.canEdit(actor, session)) throw forbidden();
  const { benchId } = session;
  if (changes.buildId !== undefined) await refuseForeignBuild(changes.buildId, benchId);
  const { conditions, title = session.title, purpose = session.purpose, buildId = session.buildId } = changes;
  await inTransaction(async (transaction) => {
    const columns = { title, purpose, buildId, ...(conditions && conditionColumns(conditions)) };
    await Session.update(columns, { where: { id: session.id, benchId }, transaction });
    const object = { type: 'session', id: session.id };
    await audit({ action: 'session.changed', accountId: actor.account.id, benchId, object }, transaction);
  });
  return getSession({ actor, sessionId });
}
