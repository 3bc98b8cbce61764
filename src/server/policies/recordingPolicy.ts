import type { Recording } from '../models/Recording.ts';
import { canInBench } from './abilities.ts';
import type { Actor } from './actor.ts';

type Owned = Pick<Recording, 'benchId' | 'uploadedBy'>;

const isOwnOrEditsAny = (actor: Actor, recording: Owned): boolean =>
  canInBench(actor, recording.benchId, 'edit-any') ||
  (recording.uploadedBy === actor.account.id && canInBench(actor, recording.benchId, 'contribute'));

export const recordingPolicy = {
  canRead: (actor: Actor, recording: Owned): boolean => canInBench(actor, recording.benchId, 'read'),
  canCreate: (actor: Actor, benchId: string): boolean => canInBench(actor, benchId, 'contribute'),
  canEdit: isOwnOrEditsAny,
  canAnalyseAgain: isOwnOrEditsAny,
  canReview: (actor: Actor, recording: Owned): boolean => canInBench(actor, recording.benchId, 'review'),
};
