import { eventsPerTurnFromGeometry, type EventsPerTurn } from '#lib/motor/eventsPerTurn.ts';
import { geometry as geometrySchema, type Geometry } from '#lib/schemas/build.ts';

/** What the typed geometry means so far; null while a count in it cannot be. */
export interface LiveEvents extends EventsPerTurn {
  readonly geometry: Geometry;
}

/** The events per turn of a geometry that is being typed. */
export function liveEvents(typed: Geometry): LiveEvents | null {
  const parsed = geometrySchema.safeParse(typed);
  if (!parsed.success) return null;
  try {
    return { geometry: parsed.data, ...eventsPerTurnFromGeometry(parsed.data) };
  } catch (error) {
    // An odd number of magnets, half way to an even one.
    if (error instanceof RangeError) return null;
    throw error;
  }
}
