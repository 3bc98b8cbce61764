import { describe, expect, it } from 'vitest';
import { buildEvents } from '#server/usecases/buildEvents.ts';

const NOTHING = { poles: null, segments: null, blades: null, teeth: null, magnets: null };
const THREE_SEGMENTS = { ...NOTHING, poles: 2, segments: 3 };

const refusalOf = (wanted: Parameters<typeof buildEvents>[0]) => {
  try {
    buildEvents(wanted);
    return null;
  } catch (error) {
    return (error as { fieldErrors: { field: string }[] }).fieldErrors.map(({ field }) => field);
  }
};

describe('buildEvents', () => {
  it('follows from the geometry: lcm of 2 poles and 3 segments is 6', () => {
    const wanted = { geometry: THREE_SEGMENTS, eventsPerTurn: null, orders: undefined };
    expect(buildEvents(wanted)).toEqual({ eventsPerTurn: 6, eventsPerTurnOrigin: 'geometry', orders: [6] });
  });

  it('prefers what a person says, and the orders that go with it', () => {
    const wanted = { geometry: THREE_SEGMENTS, eventsPerTurn: 12, orders: [12, 6] };
    expect(buildEvents(wanted)).toEqual({ eventsPerTurn: 12, eventsPerTurnOrigin: 'given', orders: [12, 6] });
  });

  it('refuses a motor of which nothing that sounds is known', () => {
    expect(refusalOf({ geometry: { ...NOTHING, poles: 2 }, eventsPerTurn: null, orders: undefined })).toEqual([
      'eventsPerTurn',
    ]);
  });

  it('refuses 7 magnets, and 398 × 399 events a turn', () => {
    const asked = { eventsPerTurn: null, orders: undefined };
    expect(refusalOf({ ...asked, geometry: { ...NOTHING, magnets: 7 } })).toEqual(['geometry.magnets']);
    expect(refusalOf({ ...asked, geometry: { ...NOTHING, poles: 398, segments: 399 } })).toEqual(['eventsPerTurn']);
  });
});
