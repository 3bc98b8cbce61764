import type { Session } from '../models/Session.ts';
import { canInBench } from './abilities.ts';
import type { Actor } from './actor.ts';

type Owned = Pick<Session, 'benchId' | 'createdBy'>;

export const sessionPolicy = {
  canRead: (actor: Actor, session: Owned): boolean => canInBench(actor, session.benchId, 'read'),
  canCreate: (actor: Actor, benchId: string): boolean => canInBench(actor, benchId, 'contribute'),
  canEdit: (actor: Actor, session: Owned): boolean =>
    canInBench(actor, session.benchId, 'edit-any') ||
    (session.createdBy === actor.account.id && canInBench(actor, session.benchId, 'contribute')),
  /** A session gathers the recordings of everyone at the bench. */
  canAddRecording: (actor: Actor, session: Owned): boolean => canInBench(actor, session.benchId, 'contribute'),
};
