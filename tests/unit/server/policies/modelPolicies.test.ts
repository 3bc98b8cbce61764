import { describe, expect, it } from 'vitest';
import { ROLES, type Role } from '#lib/schemas/account.ts';
import { canInBench, readableBenchIds } from '#server/policies/abilities.ts';
import type { Actor } from '#server/policies/actor.ts';
import { buildPolicy } from '#server/policies/buildPolicy.ts';
import { recordingPolicy } from '#server/policies/recordingPolicy.ts';
import { sessionPolicy } from '#server/policies/sessionPolicy.ts';

const HERE = 'bench-here';
const SELF = 'self';

function actor(role: Role | null, options: { access?: 'read' | 'write'; benchId?: string } = {}): Actor {
  const { access = 'write', benchId = HERE } = options;
  const memberships = role === null ? [] : [{ benchId, benchName: 'Bench', role }];
  return { account: { id: SELF, email: 'a@b.example', name: 'A' }, memberships, via: 'token', access };
}

/** Everyone who may do nothing at all to a record of the bench HERE. */
const OUTSIDERS: readonly Actor[] = [actor(null), actor('owner', { benchId: 'bench-there' })];

/** Claim, then who may: owner, lead, member on an own record; then on a colleague's. A viewer reads, and no more. */
const READS = [true, true, true, true, true, true];
const EDITS = [true, true, true, true, true, false];
const ADDS = READS;

const owned = { benchId: HERE };
const POLICIES: [string, (who: Actor, ownerId: string) => boolean, boolean[], viewerMay: boolean][] = [
  ['buildPolicy.canRead', (who, createdBy) => buildPolicy.canRead(who, { ...owned, createdBy }), READS, true],
  ['buildPolicy.canCreate', (who) => buildPolicy.canCreate(who, HERE), ADDS, false],
  ['buildPolicy.canEdit', (who, createdBy) => buildPolicy.canEdit(who, { ...owned, createdBy }), EDITS, false],
  ['sessionPolicy.canRead', (who, createdBy) => sessionPolicy.canRead(who, { ...owned, createdBy }), READS, true],
  ['sessionPolicy.canCreate', (who) => sessionPolicy.canCreate(who, HERE), ADDS, false],
  ['sessionPolicy.canEdit', (who, createdBy) => sessionPolicy.canEdit(who, { ...owned, createdBy }), EDITS, false],
  [
    'sessionPolicy.canAddRecording',
    (who, createdBy) => sessionPolicy.canAddRecording(who, { ...owned, createdBy }),
    ADDS,
    false,
  ],
  ['recordingPolicy.canRead', (who, uploadedBy) => recordingPolicy.canRead(who, { ...owned, uploadedBy }), READS, true],
  ['recordingPolicy.canCreate', (who) => recordingPolicy.canCreate(who, HERE), ADDS, false],
  [
    'recordingPolicy.canEdit',
    (who, uploadedBy) => recordingPolicy.canEdit(who, { ...owned, uploadedBy }),
    EDITS,
    false,
  ],
  [
    'recordingPolicy.canAnalyseAgain',
    (who, uploadedBy) => recordingPolicy.canAnalyseAgain(who, { ...owned, uploadedBy }),
    EDITS,
    false,
  ],
  [
    'recordingPolicy.canReview',
    (who, uploadedBy) => recordingPolicy.canReview(who, { ...owned, uploadedBy }),
    EDITS,
    false,
  ],
];

describe.each(POLICIES)('%s', (_name, may, expected, viewerMay) => {
  it('decides by role and by whose record it is', () => {
    const decisions = [SELF, 'colleague'].flatMap((ownerId) =>
      (['owner', 'lead', 'member'] as const).map((role) => may(actor(role), ownerId)),
    );
    expect(decisions).toEqual(expected);
  });

  it('lets a viewer read at most, even what the viewer once made', () => {
    expect([SELF, 'colleague'].map((ownerId) => may(actor('viewer'), ownerId))).toEqual([viewerMay, viewerMay]);
  });

  it('lets a read token read at most, whatever its role', () => {
    for (const role of ROLES) expect(may(actor(role, { access: 'read' }), SELF)).toBe(viewerMay);
  });

  it('lets nobody of another bench do anything, even to an own record', () => {
    for (const outsider of OUTSIDERS) expect(may(outsider, SELF)).toBe(false);
  });
});

describe('canInBench', () => {
  it('looks at the role in that bench, not at the highest one', () => {
    const memberships = [
      { benchId: HERE, benchName: 'Here', role: 'viewer' },
      { benchId: 'bench-there', benchName: 'There', role: 'owner' },
    ] as const;
    const both = { ...actor(null), memberships };
    expect([HERE, 'bench-there'].map((benchId) => canInBench(both, benchId, 'review'))).toEqual([false, true]);
    expect(readableBenchIds(both)).toEqual([HERE, 'bench-there']);
  });
});
