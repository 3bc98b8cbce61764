import type { Recording } from '../models/Recording.ts';
import { canInBench } from './abilities.ts';
import type { Actor } from './actor.ts';

type Owned = Pick<Recording, 'benchId' | 'uploadedBy'>;

const isOwn = (actor: Actor, recording: Owned): boolean =>
  recording.uploadedBy === actor.account.id && canInBench(actor, recording.benchId, 'contribute');

const isOwnOrEditsAny = (actor: Actor, recording: Owned): boolean =>
  canInBench(actor, recording.benchId, 'edit-any') || isOwn(actor, recording);

export const recordingPolicy = {
  canRead: (actor: Actor, recording: Owned): boolean => canInBench(actor, recording.benchId, 'read'),
  canCreate: (actor: Actor, benchId: string): boolean => canInBench(actor, benchId, 'contribute'),
  canEdit: isOwnOrEditsAny,
  canAnalyseAgain: isOwnOrEditsAny,
  /** Everyone may judge what they recorded themselves; to judge for others is a lead's part. */
  canReview: (actor: Actor, recording: Owned): boolean =>
    canInBench(actor, recording.benchId, 'review') || isOwn(actor, recording),
};
