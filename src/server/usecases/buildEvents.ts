import { eventsPerTurnFromGeometry } from '#lib/motor/eventsPerTurn.ts';
import type { Geometry } from '#lib/schemas/build.ts';
import { EVENTS_PER_TURN_MAXIMUM } from '#lib/schemas/fields.ts';
import { invalidFields } from '../errors.ts';
import type { Build } from '../models/Build.ts';

type BuildEvents = Pick<Build, 'eventsPerTurn' | 'eventsPerTurnOrigin' | 'orders'>;

interface EventsOfBuild {
  readonly geometry: Geometry;
  /** What a person says wins over the geometry; null when nobody said anything. */
  readonly eventsPerTurn: number | null;
  /** undefined: as the geometry says. */
  readonly orders: readonly number[] | undefined;
}

/**
 * The events per turn of a build, with their origin.
 *
 * @throws ServerError invalid-fields when neither a number nor a part that makes sound is given, or when the
 *   geometry leads to no usable number.
 */
export function buildEvents({ geometry, eventsPerTurn, orders }: EventsOfBuild): BuildEvents {
  if (eventsPerTurn !== null) {
    return { eventsPerTurn, eventsPerTurnOrigin: 'given', orders: [...(orders ?? [])] };
  }
  refuseSilentGeometry(geometry);
  const computed = eventsPerTurnFromGeometry(geometry);
  if (computed.eventsPerTurn > EVENTS_PER_TURN_MAXIMUM) {
    const message = `This geometry makes ${String(computed.eventsPerTurn)} events a turn, above ${String(EVENTS_PER_TURN_MAXIMUM)}. Check the counts, or give the number.`;
    throw invalidFields([{ field: 'eventsPerTurn', message }]);
  }
  return {
    eventsPerTurn: computed.eventsPerTurn,
    eventsPerTurnOrigin: 'geometry',
    orders: [...(orders ?? computed.orders)],
  };
}

function refuseSilentGeometry({ segments, blades, teeth, magnets }: Geometry): void {
  if (magnets !== null && magnets % 2 !== 0) {
    throw invalidFields([{ field: 'geometry.magnets', message: 'Must be even: two magnets make one pole pair.' }]);
  }
  if (segments ?? blades ?? teeth ?? magnets) return;
  const message = 'Give the events per turn, or count the segments, blades, teeth or magnets so that they follow.';
  throw invalidFields([{ field: 'eventsPerTurn', message }]);
}
