import type { MotorGeometry } from './geometry.ts';
import { leastCommonMultiple } from './leastCommonMultiple.ts';

/** Commutation steps of a three-phase bridge in one electrical turn: the torque, and so the sound, ripples with it. */
const STEPS_PER_ELECTRICAL_TURN = 6;
/** The field of the rotor attracts the stator twice in one electrical turn, whatever its sign. */
const PULLS_PER_POLE_PAIR = 2;

/** The sound orders of one motor: what to count, what else to expect, and why. */
export interface EventsPerTurn {
  /** Sound events in one shaft turn that the speed is counted by. */
  readonly eventsPerTurn: number;
  /** All strong orders to expect, dimensionless multiples of the shaft rate; the first is `eventsPerTurn`. */
  readonly orders: number[];
  /** One sentence for people. */
  readonly explanation: string;
}

interface Source {
  readonly orders: number[];
  readonly reason: string;
}

/**
 * Events per turn of the sound that a motor of this geometry makes.
 *
 * A commutator with K segments under B evenly spaced brush sites switches at K·B brush–gap passages, of
 * which those at the same angle are one event: lcm(B, K). A brushless rotor with p pole pairs ripples at
 * 6p and hums at 2p. Blades and teeth count for themselves. When several parts make sound, the
 * commutator counts before blades, blades before teeth, teeth before magnets; the others remain as
 * orders to expect.
 *
 * @param geometry counts of the parts; null for unknown. Two poles are assumed when only segments are given.
 * @returns events per turn ≥ 1; 1 with an honest explanation when nothing is known
 * @throws {RangeError} when a count is neither null nor a positive integer, or magnets are odd
 * @example eventsPerTurnFromGeometry({ poles: 2, segments: 3, blades: null, teeth: null, magnets: null }).eventsPerTurn // 6
 * Reference: Microchip application note AN3049 (ripple counting of brushed motors): ripples per turn =
 * poles · segments / gcd(poles, segments).
 */
export function eventsPerTurnFromGeometry(geometry: MotorGeometry): EventsPerTurn {
  const sources = [commutator(geometry), blades(geometry), teeth(geometry), magnets(geometry)].filter(
    (source) => source !== null,
  );
  const orders = [...new Set(sources.flatMap((source) => source.orders))];
  const [eventsPerTurn] = orders;
  if (eventsPerTurn === undefined) {
    return {
      eventsPerTurn: 1,
      orders: [1],
      explanation: 'No part that makes events is known, so one event per turn is assumed.',
    };
  }
  return {
    eventsPerTurn,
    orders,
    explanation: sources.map((source) => source.reason).join(' '),
  };
}

function commutator({ poles, segments }: MotorGeometry): Source | null {
  if (segments === null) return null;
  const sites = countOf('poles', poles ?? 2);
  const count = leastCommonMultiple(sites, countOf('segments', segments));
  const assumed = poles === null ? ' (two brush sites assumed)' : '';
  return {
    orders: [count],
    reason: `${segments} segments under ${sites} brush sites${assumed} switch ${count} times a turn.`,
  };
}

function blades(geometry: MotorGeometry): Source | null {
  if (geometry.blades === null) return null;
  const count = countOf('blades', geometry.blades);
  return {
    orders: [count],
    reason: `${count} ${count === 1 ? 'blade passes' : 'blades pass'} once a turn each.`,
  };
}

function teeth(geometry: MotorGeometry): Source | null {
  if (geometry.teeth === null) return null;
  const count = countOf('teeth', geometry.teeth);
  return { orders: [count], reason: `${count} teeth mesh once a turn each.` };
}

function magnets(geometry: MotorGeometry): Source | null {
  if (geometry.magnets === null) return null;
  const count = countOf('magnets', geometry.magnets);
  if (count % 2 !== 0) throw new RangeError(`eventsPerTurnFromGeometry: magnets must be even, got ${count}`);
  const polePairs = count / 2;
  return {
    orders: [STEPS_PER_ELECTRICAL_TURN * polePairs, PULLS_PER_POLE_PAIR * polePairs, polePairs],
    reason: `${polePairs} pole pairs of a three-phase motor ripple ${STEPS_PER_ELECTRICAL_TURN * polePairs} times a turn.`,
  };
}

function countOf(name: keyof MotorGeometry, value: number): number {
  if (!Number.isInteger(value) || value < 1) {
    throw new RangeError(`eventsPerTurnFromGeometry: ${name} must be a positive integer, got ${value}`);
  }
  return value;
}
