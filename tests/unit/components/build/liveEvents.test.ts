import { describe, expect, it } from 'vitest';
import { buildOf, geometryOf, NO_BUILD_TEXTS } from '#components/build/buildTexts.ts';
import { liveEvents } from '#components/build/liveEvents.ts';

const typed = (texts: Partial<typeof NO_BUILD_TEXTS>) => liveEvents(geometryOf({ ...NO_BUILD_TEXTS, ...texts }));

describe('liveEvents', () => {
  it('counts 3 segments under 2 poles as 6 while they are typed', () => {
    expect(typed({ segments: '3', poles: '2' })?.eventsPerTurn).toBe(6);
  });

  it.each([
    ['a fraction', { segments: '3.5' }],
    ['no number', { blades: 'four' }],
    ['an odd number of magnets on the way to 14', { magnets: '1' }],
    ['more than 400 teeth', { teeth: '401' }],
  ])('is null for %s', (_, texts) => {
    expect(typed(texts)).toBeNull();
  });

  it('is one event a turn while nothing is typed', () => {
    expect(typed({})?.eventsPerTurn).toBe(1);
  });
});

describe('buildOf', () => {
  it('leaves the count to the geometry when its box is empty', () => {
    expect(buildOf({ ...NO_BUILD_TEXTS, name: 'Heron', segments: '3' })).toEqual({
      name: 'Heron',
      geometry: { segments: 3, poles: null, blades: null, teeth: null, magnets: null },
      eventsPerTurn: null,
      rpmMin: null,
      rpmMax: null,
      notes: null,
    });
  });
});
