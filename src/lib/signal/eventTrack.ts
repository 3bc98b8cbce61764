import { FRAME_SECONDS } from './lineMap.ts';
import { hertzOfCell } from './logGrid.ts';

/** Course of the event rate over time; between knots it is linear, beyond them constant. */
export interface EventTrack {
  /** Event rate at knot i, which stands at (i + ½) · `FRAME_SECONDS`; Hz, > 0 even where nothing is heard. Shape [knotCount]. */
  readonly eventHz: Float64Array;
  /** Whether events are heard around a knot, shape [knotCount]: 1 or 0. */
  readonly isActive: Uint8Array;
}

/** Time of a knot, seconds from the start of the recording. */
export function knotSeconds(knot: number): number {
  return (knot + 0.5) * FRAME_SECONDS;
}

/** Half-width of the triangular smoothing, knots. */
const SMOOTHING_KNOTS = 2;

/**
 * A smooth track along the cells of a path. Where the path is silent the rate is carried over from its surroundings.
 *
 * @param cells cell of the logarithmic grid at each frame, −1 for silence; at least one must not be silent
 */
export function trackFromCells(cells: Int32Array): EventTrack {
  const isActive = Uint8Array.from(cells, (cell) => (cell >= 0 ? 1 : 0));
  const filled = fillGaps(cells);
  const middle = filled.map((cell, knot) => medianOfThree(filled[knot - 1] ?? cell, cell, filled[knot + 1] ?? cell));
  const eventHz = middle.map((_, knot) => {
    let sum = 0;
    let weights = 0;
    for (let offset = -SMOOTHING_KNOTS; offset <= SMOOTHING_KNOTS; offset++) {
      const neighbour = middle[knot + offset];
      if (neighbour === undefined) continue;
      const weight = SMOOTHING_KNOTS + 1 - Math.abs(offset);
      sum += weight * neighbour;
      weights += weight;
    }
    return hertzOfCell(sum / weights);
  });
  return { eventHz, isActive };
}

function fillGaps(cells: Int32Array): Float64Array {
  const filled = Float64Array.from(cells);
  const first = cells.find((cell) => cell >= 0);
  if (first === undefined) throw new RangeError('trackFromCells: cells must hold at least one that is not silent');
  let last = first;
  for (let frame = 0; frame < filled.length; frame++) {
    if ((filled[frame] as number) < 0) filled[frame] = last;
    last = filled[frame] as number;
  }
  return filled;
}

function medianOfThree(a: number, b: number, c: number): number {
  return Math.max(Math.min(a, b), Math.min(Math.max(a, b), c));
}

/** A stretch of time in which events are heard without a gap. */
export interface ActiveStretch {
  readonly startSeconds: number;
  readonly endSeconds: number;
  /** Knots [firstKnot, endKnot). */
  readonly firstKnot: number;
  readonly endKnot: number;
}

/** The longest stretch in which events are heard; empty at the start when there is none. */
export function longestActiveStretch({ isActive }: EventTrack): ActiveStretch {
  let best = { first: 0, end: 0 };
  let first = -1;
  for (let knot = 0; knot <= isActive.length; knot++) {
    if (isActive[knot] === 1) {
      if (first < 0) first = knot;
    } else if (first >= 0) {
      if (knot - first > best.end - best.first) best = { first, end: knot };
      first = -1;
    }
  }
  return {
    startSeconds: best.first * FRAME_SECONDS,
    endSeconds: best.end * FRAME_SECONDS,
    firstKnot: best.first,
    endKnot: best.end,
  };
}

/** The angle that belongs to a track. */
export interface EventPhase {
  /** Events since the start of the recording, shape [knotCount]. */
  readonly cyclesAtKnot: Float64Array;
  readonly track: EventTrack;
}

/** Integrates a track into events since the start of the recording. */
export function eventPhase(track: EventTrack): EventPhase {
  const { eventHz } = track;
  const cyclesAtKnot = new Float64Array(eventHz.length);
  let cycles = (eventHz[0] ?? 0) * knotSeconds(0);
  for (let knot = 0; knot < eventHz.length; knot++) {
    if (knot > 0) cycles += (FRAME_SECONDS * ((eventHz[knot - 1] as number) + (eventHz[knot] as number))) / 2;
    cyclesAtKnot[knot] = cycles;
  }
  return { cyclesAtKnot, track };
}

/** Events since the start of the recording at a time. */
export function cyclesAt({ cyclesAtKnot, track }: EventPhase, timeSeconds: number): number {
  const last = cyclesAtKnot.length - 1;
  const knot = Math.max(0, Math.min(last, Math.floor(timeSeconds / FRAME_SECONDS - 0.5)));
  const since = timeSeconds - knotSeconds(knot);
  const hertz = track.eventHz[knot] as number;
  const isBeyond = knot === last || since < 0;
  const slope = isBeyond ? 0 : ((track.eventHz[knot + 1] as number) - hertz) / FRAME_SECONDS;
  return (cyclesAtKnot[knot] as number) + since * (hertz + (slope * since) / 2);
}

/** Inverse of `cyclesAt` for a rising sequence of phases: remembers where it was. */
export function createSecondsAt({ cyclesAtKnot, track }: EventPhase): (cycles: number) => number {
  const last = cyclesAtKnot.length - 1;
  let knot = 0;
  return (cycles) => {
    while (knot < last && (cyclesAtKnot[knot + 1] as number) <= cycles) knot++;
    while (knot > 0 && (cyclesAtKnot[knot] as number) > cycles) knot--;
    const ahead = cycles - (cyclesAtKnot[knot] as number);
    const hertz = track.eventHz[knot] as number;
    if (knot === last || ahead < 0) return knotSeconds(knot) + ahead / hertz;
    const slope = ((track.eventHz[knot + 1] as number) - hertz) / FRAME_SECONDS;
    // Root of hertz·t + slope·t²/2 = ahead in the form that stays exact as the slope vanishes.
    return knotSeconds(knot) + (2 * ahead) / (hertz + Math.sqrt(Math.max(0, hertz * hertz + 2 * slope * ahead)));
  };
}
