import { describe, expect, it } from 'vitest';
import { eventsPerTurnFromGeometry } from '#lib/motor/eventsPerTurn.ts';
import type { MotorGeometry } from '#lib/motor/geometry.ts';

const NOTHING: MotorGeometry = {
  poles: null,
  segments: null,
  blades: null,
  teeth: null,
  magnets: null,
};

describe('eventsPerTurnFromGeometry', () => {
  // Ripples per turn = lcm(brush sites, segments): check-values.json, orders/ripple-*, after Microchip AN3049.
  it.each([
    [2, 2, 2],
    [2, 3, 6],
    [2, 5, 10],
    [2, 7, 14],
    [2, 8, 8],
    [2, 12, 12],
    [4, 3, 12],
    [4, 5, 20],
    [4, 6, 12],
    [4, 8, 8],
    [4, 10, 20],
    [6, 7, 42],
  ])('counts the ripples of %d brush sites over %d segments as %d', (poles, segments, ripples) => {
    expect(eventsPerTurnFromGeometry({ ...NOTHING, poles, segments }).eventsPerTurn).toBe(ripples);
  });

  it('assumes two brush sites when only segments are known, and says so', () => {
    const { eventsPerTurn, explanation } = eventsPerTurnFromGeometry({
      ...NOTHING,
      segments: 3,
    });
    expect(eventsPerTurn).toBe(6);
    expect(explanation).toContain('two brush sites assumed');
  });

  it('counts blades, and teeth after blades', () => {
    const { eventsPerTurn, orders } = eventsPerTurnFromGeometry({
      ...NOTHING,
      blades: 5,
      teeth: 12,
    });
    expect(eventsPerTurn).toBe(5);
    expect(orders).toEqual([5, 12]);
  });

  it('keeps the blades as an order to expect beside the commutator', () => {
    expect(
      eventsPerTurnFromGeometry({
        ...NOTHING,
        poles: 2,
        segments: 3,
        blades: 4,
      }).orders,
    ).toEqual([6, 4]);
  });

  // check-values.json, orders/bldc: 14 magnets at 10,000 rpm ripple at 7000 Hz, which is order 42.
  it('expects the six-step ripple, the pulls and the electrical order of 14 magnets', () => {
    const { eventsPerTurn, orders } = eventsPerTurnFromGeometry({
      ...NOTHING,
      magnets: 14,
    });
    expect(eventsPerTurn).toBe(42);
    expect(orders).toEqual([42, 14, 7]);
  });

  it('assumes one event a turn when nothing is known, and says so', () => {
    const { eventsPerTurn, orders, explanation } = eventsPerTurnFromGeometry(NOTHING);
    expect([eventsPerTurn, orders]).toEqual([1, [1]]);
    expect(explanation).toContain('one event per turn is assumed');
  });

  it.each([
    [{ ...NOTHING, blades: 0 }, 'blades must be a positive integer, got 0'],
    [{ ...NOTHING, segments: 2.5 }, 'segments must be a positive integer, got 2.5'],
    [{ ...NOTHING, magnets: 7 }, 'magnets must be even, got 7'],
  ])('refuses %o', (geometry, message) => {
    expect(() => eventsPerTurnFromGeometry(geometry)).toThrow(message);
  });
});
