import {
  bladeMarks,
  cutRing,
  evenly,
  pointOnRing,
  poleArcs,
  SEGMENT_BAND,
  sectorPath,
  toothMarks,
} from './ringGeometry.ts';

/** Counts of the parts of one motor; null for unknown or absent. */
export interface RingGeometry {
  readonly poles: number | null;
  readonly segments: number | null;
  readonly blades: number | null;
  readonly teeth: number | null;
  readonly magnets: number | null;
}

interface Props {
  readonly geometry: RingGeometry;
  /** Edge length, px: beside a name, on a reading, on the page of the build. */
  readonly size: 24 | 72 | 240;
  /** At 240 px: numbers the events of one turn inside the ring. */
  readonly eventsPerTurn?: number;
  /** False where a name beside the ring already says which motor it is. */
  readonly isNamed?: boolean;
}

/** More marks than this are not countable at 24 px. */
const MOST_MARKS_AT_24_PX = 14;
const MOST_NUMBERED_EVENTS = 24;
const EVENT_RADIUS = 32;
const PART_NAMES = { segments: 'segment', poles: 'pole', blades: 'blade', teeth: 'tooth', magnets: 'magnet' } as const;

/** The motor's ring, cut as its commutator is: one ink, poles outside, blades or teeth at the edge. */
export function CommutatorRing({ geometry, size, eventsPerTurn, isNamed = true }: Props) {
  const most = mostMarks(geometry);
  const isPlain = size === 24 && most > MOST_MARKS_AT_24_PX;
  return (
    <svg
      viewBox="-100 -100 200 200"
      width={size}
      height={size}
      className="inline-block shrink-0 fill-current"
      {...(isNamed ? { role: 'img', 'aria-label': ringInWords(geometry) } : { 'aria-hidden': true })}
    >
      {isPlain ? <CountedRing count={geometry.segments ?? most} /> : <Parts geometry={geometry} />}
      {size === 240 && eventsPerTurn !== undefined && <EventNumbers count={eventsPerTurn} />}
    </svg>
  );
}

function Parts({ geometry: { segments, magnets, poles, blades, teeth } }: { geometry: RingGeometry }) {
  const cuts = segments ?? magnets;
  return (
    <>
      {cuts === null ? (
        <circle
          r={(SEGMENT_BAND.innerRadius + SEGMENT_BAND.outerRadius) / 2}
          className="fill-none stroke-current"
          strokeWidth={8}
        />
      ) : (
        <Paths of={cutRing(SEGMENT_BAND, cuts)} />
      )}
      {poles !== null && <Paths of={poleArcs(poles)} />}
      {blades !== null && <Paths of={bladeMarks(blades)} />}
      {blades === null && teeth !== null && <Paths of={toothMarks(teeth)} />}
    </>
  );
}

function Paths({ of }: { of: readonly string[] }) {
  return of.map((path) => <path key={path} d={path} />);
}

function CountedRing({ count }: { count: number }) {
  return (
    <>
      <path
        d={`${sectorPath({ innerRadius: 84, outerRadius: 98 }, 0, 1 / 2)}${sectorPath({ innerRadius: 84, outerRadius: 98 }, 1 / 2, 1)}`}
      />
      <text textAnchor="middle" dominantBaseline="central" className="figures" fontSize={count > 99 ? 72 : 92}>
        {count}
      </text>
    </>
  );
}

function EventNumbers({ count }: { count: number }) {
  if (!Number.isInteger(count) || count > MOST_NUMBERED_EVENTS) return null;
  return (
    <g className="figures" fontSize={count > 12 ? 7 : 10} textAnchor="middle" dominantBaseline="central">
      {evenly(count).map((turn, index) => (
        <text key={turn} {...pointOnRing(EVENT_RADIUS, turn)}>
          {index + 1}
        </text>
      ))}
    </g>
  );
}

function mostMarks({ poles, segments, blades, teeth, magnets }: RingGeometry): number {
  return Math.max(poles ?? 0, segments ?? 0, blades ?? 0, teeth ?? 0, magnets ?? 0);
}

/** What the ring shows, for those who do not see it. */
export function ringInWords(geometry: RingGeometry): string {
  const parts = (['segments', 'poles', 'blades', 'teeth', 'magnets'] as const).flatMap((name) => {
    const count = geometry[name];
    return count === null ? [] : [`${String(count)} ${count === 1 ? PART_NAMES[name] : name}`];
  });
  return parts.length === 0 ? 'Ring of a motor whose parts nobody counted' : `Ring with ${parts.join(', ')}`;
}
