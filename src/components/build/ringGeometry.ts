/**
 * The commutator ring in numbers. Angles are fractions of a turn, clockwise from the top; lengths are
 * in units of a box from −100 to 100 in both directions.
 */

/** Inner and outer radius of a band of the ring. */
export interface Band {
  readonly innerRadius: number;
  readonly outerRadius: number;
}

export const SEGMENT_BAND: Band = { innerRadius: 44, outerRadius: 68 };
export const POLE_BAND: Band = { innerRadius: 77, outerRadius: 85 };
export const OUTER_MARK_BAND: Band = { innerRadius: 90, outerRadius: 99 };

/** Width of the cut between two segments at small size, in units of the box. */
const WIDEST_CUT = 9;
/** A cut takes at most this fraction of one segment's share of the ring. */
const CUT_FRACTION_OF_SHARE = 0.3;
const POLE_FRACTION_OF_SHARE = 0.6;
const BLADE_FRACTION_OF_SHARE = 0.16;
const TOOTH_FRACTION_OF_SHARE = 0.5;

const DECIMALS = 2;
const number = (value: number) => String(Number(value.toFixed(DECIMALS)));

/** The point at a radius and an angle, rounded: engines differ in the last digit of a sine, and server and page must not. */
export function pointOnRing(radius: number, turnFraction: number): { x: number; y: number } {
  const angle = 2 * Math.PI * turnFraction;
  const rounded = (value: number) => Number(value.toFixed(DECIMALS));
  return { x: rounded(radius * Math.sin(angle)), y: rounded(-radius * Math.cos(angle)) };
}

/** SVG path of one sector of a band, from one angle to a later one. */
export function sectorPath({ innerRadius, outerRadius }: Band, fromTurn: number, toTurn: number): string {
  const isLong = toTurn - fromTurn > 1 / 2 ? 1 : 0;
  const at = (radius: number, turn: number) => {
    const { x, y } = pointOnRing(radius, turn);
    return `${number(x)} ${number(y)}`;
  };
  return [
    `M${at(outerRadius, fromTurn)}`,
    `A${number(outerRadius)} ${number(outerRadius)} 0 ${String(isLong)} 1 ${at(outerRadius, toTurn)}`,
    `L${at(innerRadius, toTurn)}`,
    `A${number(innerRadius)} ${number(innerRadius)} 0 ${String(isLong)} 0 ${at(innerRadius, fromTurn)}`,
    'Z',
  ].join('');
}

/** Sectors of a ring cut into equal parts, the first centred on the top. One part is a ring with one cut. */
export function cutRing(band: Band, count: number): string[] {
  const share = 1 / count;
  const meanCircumference = Math.PI * (band.innerRadius + band.outerRadius);
  const cut = Math.min(WIDEST_CUT / meanCircumference, share * CUT_FRACTION_OF_SHARE);
  return evenly(count).map((centre) => sectorPath(band, centre - (share - cut) / 2, centre + (share - cut) / 2));
}

/** Poles: arcs outside the segments, the first centred on the top. */
export function poleArcs(count: number): string[] {
  return marks(POLE_BAND, count, POLE_FRACTION_OF_SHARE);
}

/** Blades: slim marks at the edge. */
export function bladeMarks(count: number): string[] {
  return marks(OUTER_MARK_BAND, count, BLADE_FRACTION_OF_SHARE);
}

/** Teeth: as wide as the gaps between them. */
export function toothMarks(count: number): string[] {
  return marks(OUTER_MARK_BAND, count, TOOTH_FRACTION_OF_SHARE);
}

/** Angles of equal parts, from 0 upwards. */
export function evenly(count: number): number[] {
  return Array.from({ length: count }, (_, index) => index / count);
}

function marks(band: Band, count: number, fractionOfShare: number): string[] {
  const half = fractionOfShare / count / 2;
  return evenly(count).map((centre) => sectorPath(band, centre - half, centre + half));
}
