import type { CombScores } from './combScore.ts';

/** The most plausible course of the event rate. */
export interface TrackPath {
  /** Cell of the grid at each frame; −1 where nothing is heard. Shape [frameCount]. */
  readonly cells: Int32Array;
  /** Mean score along the frames with a cell; 0 when there is none. */
  readonly meanScore: number;
  /** Frames with a cell. */
  readonly activeCount: number;
}

/** Cost of moving one cell (0.58 %) from one frame to the next. */
const COST_PER_CELL = 0.35;
/** Cost of any jump: shafts have inertia and do not jump, so only a wholly new sound is worth it. */
const JUMP_COST = 20;
/** Cost of starting or stopping. */
const SWITCH_COST = 9;
/** Score of a frame in which nothing is heard: about what the best cell of noise reaches on average. */
export const SILENT_SCORE = 2.6;
/** Marks in the table of predecessors. */
const FROM_SILENCE = -1;

/**
 * Best course through the scores with a penalty on movement, by dynamic programming.
 *
 * @param isMasked cells that the course must avoid, shape [cellCount], or null
 * References: A. Viterbi (1967), Error bounds for convolutional codes, IEEE Trans. IT-13; linear-time minimum over
 * all moves, P. Felzenszwalb & D. Huttenlocher (2012), Distance transforms of sampled functions, Theory of Computing 8.
 */
export function trackPath(combs: CombScores, isMasked: ((frame: number, cell: number) => boolean) | null): TrackPath {
  const { frameCount, cellCount, firstCell, scores } = combs;
  const predecessors = new Int16Array(frameCount * cellCount);
  const silencePredecessors = new Int16Array(frameCount).fill(FROM_SILENCE);
  let values = new Float64Array(cellCount);
  let silence = 0;
  const state = {
    reached: new Float64Array(cellCount),
    origin: new Int16Array(cellCount),
  };
  for (let frame = 0; frame < frameCount; frame++) {
    const best = spread(values, silence, state);
    const bestValue = best < 0 ? -Infinity : (values[best] as number);
    const next = new Float64Array(cellCount);
    for (let cell = 0; cell < cellCount; cell++) {
      const score = isMasked?.(frame, cell) ? 0 : (scores[frame * cellCount + cell] as number);
      next[cell] = (state.reached[cell] as number) + score;
    }
    predecessors.set(state.origin, frame * cellCount);
    if (frame > 0 && bestValue - SWITCH_COST > silence) {
      silence = bestValue - SWITCH_COST + SILENT_SCORE;
      silencePredecessors[frame] = best;
    } else {
      silence += SILENT_SCORE;
    }
    values = next;
  }
  return traceBack({ frameCount, cellCount, firstCell, scores }, predecessors, silencePredecessors, values, silence);
}

/** Best way into every cell from the last frame; returns the best cell of the last frame, or −1. */
function spread(
  values: Float64Array,
  silence: number,
  state: { readonly reached: Float64Array; readonly origin: Int16Array },
): number {
  const { reached, origin } = state;
  let best = -1;
  for (let cell = 0; cell < values.length; cell++) {
    if (best < 0 || (values[cell] as number) > (values[best] as number)) best = cell;
  }
  const jump = best < 0 ? -Infinity : (values[best] as number) - JUMP_COST;
  const isSilenceBetter = silence - SWITCH_COST >= jump;
  const base = isSilenceBetter ? silence - SWITCH_COST : jump;
  const baseOrigin = isSilenceBetter ? FROM_SILENCE : best;
  for (let cell = 0; cell < values.length; cell++) {
    const stay = values[cell] as number;
    reached[cell] = Math.max(stay, base);
    origin[cell] = stay >= base ? cell : baseOrigin;
  }
  for (let cell = 1; cell < values.length; cell++) sweep(reached, origin, cell, cell - 1);
  for (let cell = values.length - 2; cell >= 0; cell--) sweep(reached, origin, cell, cell + 1);
  return best;
}

function sweep(reached: Float64Array, origin: Int16Array, cell: number, neighbour: number): void {
  const moved = (reached[neighbour] as number) - COST_PER_CELL;
  if (moved <= (reached[cell] as number)) return;
  reached[cell] = moved;
  origin[cell] = origin[neighbour] as number;
}

function traceBack(
  combs: CombScores,
  predecessors: Int16Array,
  silencePredecessors: Int16Array,
  values: Float64Array,
  silence: number,
): TrackPath {
  const { frameCount, cellCount, firstCell, scores } = combs;
  const cells = new Int32Array(frameCount).fill(-1);
  let current = FROM_SILENCE;
  let bestValue = silence;
  for (let cell = 0; cell < cellCount; cell++) {
    if ((values[cell] as number) > bestValue) {
      bestValue = values[cell] as number;
      current = cell;
    }
  }
  let total = 0;
  let activeCount = 0;
  for (let frame = frameCount - 1; frame >= 0; frame--) {
    if (current === FROM_SILENCE) {
      current = silencePredecessors[frame] as number;
      continue;
    }
    cells[frame] = firstCell + current;
    total += scores[frame * cellCount + current] as number;
    activeCount++;
    current = predecessors[frame * cellCount + current] as number;
  }
  return {
    cells,
    meanScore: activeCount > 0 ? total / activeCount : 0,
    activeCount,
  };
}

/** A constant course: the event rate with the highest mean score over all frames. */
export function steadyPath(combs: CombScores): TrackPath {
  const { frameCount, cellCount, firstCell, scores } = combs;
  const sums = new Float64Array(cellCount);
  for (let frame = 0; frame < frameCount; frame++) {
    for (let cell = 0; cell < cellCount; cell++)
      sums[cell] = (sums[cell] as number) + (scores[frame * cellCount + cell] as number);
  }
  let best = 0;
  for (let cell = 1; cell < cellCount; cell++) if ((sums[cell] as number) > (sums[best] as number)) best = cell;
  return {
    cells: new Int32Array(frameCount).fill(firstCell + best),
    meanScore: (sums[best] ?? 0) / frameCount,
    activeCount: frameCount,
  };
}
