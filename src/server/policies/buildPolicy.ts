import type { Build } from '../models/Build.ts';
import { canInBench } from './abilities.ts';
import type { Actor } from './actor.ts';

type Owned = Pick<Build, 'benchId' | 'createdBy'>;

export const buildPolicy = {
  canRead: (actor: Actor, build: Owned): boolean => canInBench(actor, build.benchId, 'read'),
  canCreate: (actor: Actor, benchId: string): boolean => canInBench(actor, benchId, 'contribute'),
  canEdit: (actor: Actor, build: Owned): boolean =>
    canInBench(actor, build.benchId, 'edit-any') ||
    (build.createdBy === actor.account.id && canInBench(actor, build.benchId, 'contribute')),
};
