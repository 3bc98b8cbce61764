import { FRAME_SECONDS } from './lineMap.ts';
import { cyclesAt } from './eventTrack.ts';
import type { EventPhase } from './eventTrack.ts';
import type { BlockGrid } from './lineBlocks.ts';
import type { WeightedLine } from './refineTrack.ts';

interface DeviationSearch {
  readonly span: number;
  readonly gridPoints: number;
  readonly windowSeconds: number;
  readonly stiffness: number;
  readonly stepSeconds: number;
  readonly phase: EventPhase;
  readonly grid: BlockGrid;
}

/** Scale of the log likelihood: overlapping windows tell less than independent ones. */
const LIKELIHOOD_SCALE = 1.5;

/**
 * The relative deviation of the rate over time that keeps lines most coherent without moving abruptly.
 *
 * @returns deviation at a time in seconds, in [−span, span]; linear between steps, constant beyond
 */
export function smoothestDeviation(
  lines: readonly WeightedLine[],
  search: DeviationSearch,
): (timeSeconds: number) => number {
  const durationSeconds = search.phase.track.eventHz.length * FRAME_SECONDS;
  const stepCount = Math.max(1, Math.round(durationSeconds / search.stepSeconds));
  const rows = Array.from({ length: stepCount }, (_, step) =>
    likelihoods(lines, search, (step + 0.5) * search.stepSeconds),
  );
  const path = stiffestPath(rows, search.stiffness);
  const gridStep = (2 * search.span) / (search.gridPoints - 1);
  const deviations = path.map(
    (point, step) => (point + peakOffset(rows[step] as Float64Array, point)) * gridStep - search.span,
  );
  return (timeSeconds) => {
    const position = Math.max(0, Math.min(stepCount - 1, timeSeconds / search.stepSeconds - 0.5));
    const left = Math.floor(position);
    const here = deviations[left] ?? 0;
    return here + (position - left) * ((deviations[left + 1] ?? here) - here);
  };
}

/** Log likelihood of every deviation of the grid around one time; shape [gridPoints]. */
function likelihoods(lines: readonly WeightedLine[], search: DeviationSearch, centreSeconds: number): Float64Array {
  const { grid, phase } = search;
  const [first, end] = [-0.5, 0.5].map((side) => {
    const cycles = cyclesAt(phase, centreSeconds + side * search.windowSeconds);
    return Math.max(0, Math.min(grid.blockCount, Math.round((cycles - grid.firstCycle) / grid.cyclesPerBlock)));
  }) as [number, number];
  const sums = new Float64Array(search.gridPoints);
  for (const line of lines) addCoherence(sums, line, { first, end, search });
  return sums.map((sum) => LIKELIHOOD_SCALE * Math.log1p(sum));
}

function addCoherence(
  sums: Float64Array,
  line: WeightedLine,
  {
    first,
    end,
    search,
  }: {
    readonly first: number;
    readonly end: number;
    readonly search: DeviationSearch;
  },
): void {
  let power = Number.MIN_VALUE;
  for (let block = first; block < end; block++) {
    power += (line.real[block] as number) ** 2 + (line.imaginary[block] as number) ** 2;
  }
  const gridStep = (2 * search.span) / (search.gridPoints - 1);
  for (let point = 0; point < sums.length; point++) {
    const deviation = point * gridStep - search.span;
    // Phase that one block gains when the rate deviates, undone by a rotation that is stepped from block to block.
    const angle = -2 * Math.PI * line.harmonic * deviation * search.grid.cyclesPerBlock;
    const [stepReal, stepImaginary] = [Math.cos(angle), Math.sin(angle)];
    let [turnReal, turnImaginary, sumReal, sumImaginary] = [1, 0, 0, 0];
    for (let block = first; block < end; block++) {
      const real = line.real[block] as number;
      const imaginary = line.imaginary[block] as number;
      sumReal += real * turnReal - imaginary * turnImaginary;
      sumImaginary += real * turnImaginary + imaginary * turnReal;
      const turned = turnReal * stepReal - turnImaginary * stepImaginary;
      turnImaginary = turnReal * stepImaginary + turnImaginary * stepReal;
      turnReal = turned;
    }
    sums[point] = (sums[point] as number) + (line.weight * (sumReal * sumReal + sumImaginary * sumImaginary)) / power;
  }
}

/** The grid point from which a move to `point` leaves the highest value. */
function bestOrigin(values: Float64Array, point: number, stiffness: number): number {
  let best = -Infinity;
  let origin = 0;
  for (let from = 0; from < values.length; from++) {
    const value = (values[from] as number) - stiffness * (point - from) ** 2;
    if (value <= best) continue;
    best = value;
    origin = from;
  }
  return origin;
}

/** Best sequence of grid points with a quadratic cost of movement (Viterbi 1967). */
function stiffestPath(rows: readonly Float64Array[], stiffness: number): number[] {
  const pointCount = rows[0]?.length ?? 0;
  let values = new Float64Array(pointCount);
  const origins: Uint8Array[] = [];
  for (const row of rows) {
    const origin = new Uint8Array(pointCount);
    const next = new Float64Array(pointCount);
    for (let point = 0; point < pointCount; point++) {
      const from = bestOrigin(values, point, stiffness);
      origin[point] = from;
      next[point] = (values[from] as number) - stiffness * (point - from) ** 2 + (row[point] as number);
    }
    origins.push(origin);
    values = next;
  }
  let point = values.indexOf(Math.max(...values));
  const path = new Array<number>(rows.length).fill(0);
  for (let step = rows.length - 1; step >= 0; step--) {
    path[step] = point;
    point = origins[step]?.[point] ?? point;
  }
  return path;
}

/** Offset of a parabola's top through three points from the middle one, in [−½, ½]; 0 at the border and on a plateau. */
function peakOffset(row: Float64Array, point: number): number {
  const [before, here, after] = [row[point - 1], row[point], row[point + 1]];
  if (before === undefined || here === undefined || after === undefined) return 0;
  const curvature = before - 2 * here + after;
  return curvature < 0 ? Math.max(-0.5, Math.min(0.5, (before - after) / (2 * curvature))) : 0;
}
