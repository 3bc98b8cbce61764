import * as z from 'zod/mini';
import {
  eventsPerTurn,
  expectedOrders,
  identifier,
  NAME_MAXIMUM_CHARACTERS,
  note,
  oneLine,
  shaftSpeedRpm,
} from './fields.ts';

/** Where the number of events per turn came from. */
export const EVENTS_PER_TURN_ORIGINS = ['geometry', 'given'] as const;

const PART_MAXIMUM_COUNT = 400;
const partCount = (minimum: number) => {
  const message = `Must be a whole number from ${String(minimum)} to ${String(PART_MAXIMUM_COUNT)}.`;
  return z.nullable(z.int(message).check(z.gte(minimum, message), z.lte(PART_MAXIMUM_COUNT, message)));
};

export const geometry = z.strictObject(
  {
    poles: z._default(partCount(1), null),
    segments: z._default(partCount(1), null),
    blades: z._default(partCount(1), null),
    teeth: z._default(partCount(1), null),
    magnets: z._default(partCount(1), null),
  },
  'Must be an object with the counts of parts.',
);
export type Geometry = z.infer<typeof geometry>;

const buildFields = {
  name: oneLine(NAME_MAXIMUM_CHARACTERS),
  geometry,
  /** Left out: computed from the geometry. */
  eventsPerTurn: z.optional(z.nullable(eventsPerTurn)),
  orders: z.optional(expectedOrders),
  rpmMin: z.optional(z.nullable(shaftSpeedRpm)),
  rpmMax: z.optional(z.nullable(shaftSpeedRpm)),
  notes: z.optional(z.nullable(note)),
};

export const createBuildRequest = z.strictObject({ benchId: z.optional(identifier), ...buildFields });
export type CreateBuildRequest = z.infer<typeof createBuildRequest>;

export const updateBuildRequest = z.partial(z.strictObject(buildFields));
export type UpdateBuildRequest = z.infer<typeof updateBuildRequest>;

export const buildView = z.object({
  id: z.uuid(),
  benchId: z.uuid(),
  name: z.string(),
  revision: z.int(),
  geometry,
  eventsPerTurn: z.number(),
  eventsPerTurnOrigin: z.enum(EVENTS_PER_TURN_ORIGINS),
  /** "3 segments × 2 poles = 6 ripples a turn" */
  eventsPerTurnExplanation: z.string(),
  orders: z.array(z.number()),
  rpmMin: z.nullable(z.number()),
  rpmMax: z.nullable(z.number()),
  notes: z.nullable(z.string()),
  recordingCount: z.int(),
  createdAt: z.string(),
  updatedAt: z.string(),
  abilities: z.object({ canEdit: z.boolean() }),
});
export type BuildView = z.infer<typeof buildView>;
