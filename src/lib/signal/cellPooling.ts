import { hertzOfCell } from './logGrid.ts';

/** Main-lobe width of a Hann window in bins: bins nearer than this are not independent. */
const INDEPENDENT_BINS = 1.5;
/** ln of the mean of exponential noise lies this far above the mean of its ln (Euler–Mascheroni constant). */
const MEAN_LOG_BIAS_NEPERS = 0.577;
/** What a line must rise above the largest noise bin to be expected in its cell. */
const MARGIN_NEPERS = 0.6;

/** How the bins of one spectrum size fill the cells of the logarithmic grid. */
export interface CellPooling {
  readonly firstCell: number;
  /** One past the last cell. */
  readonly endCell: number;
  /** First bin of each cell; where a cell is narrower than a bin, the bin below its centre. Shape [endCell − firstCell]. */
  readonly firstBin: Int32Array;
  /** One past the last bin of each cell; equal to `firstBin` for a cell that is interpolated. */
  readonly endBin: Int32Array;
  /** Weight of the bin above, for cells that are interpolated. */
  readonly fraction: Float32Array;
  /** Level that noise is expected to reach in the cell, nepers above the floor. */
  readonly threshold: Float32Array;
}

/**
 * Plan of the pooling: narrow cells are interpolated between bins, wide ones take the maximum of theirs.
 *
 * @param options bins stand at multiples of `binHz`; cells from `firstCell` up to but without `endCell`
 */
export function createCellPooling(options: {
  readonly binHz: number;
  readonly firstCell: number;
  readonly endCell: number;
}): CellPooling {
  const { binHz, firstCell, endCell } = options;
  const count = Math.max(0, endCell - firstCell);
  const pooling = {
    firstCell,
    endCell: firstCell + count,
    firstBin: new Int32Array(count),
    endBin: new Int32Array(count),
    fraction: new Float32Array(count),
    threshold: new Float32Array(count),
  };
  for (let index = 0; index < count; index++) {
    const cell = firstCell + index;
    const low = hertzOfCell(cell - 0.5) / binHz;
    const high = hertzOfCell(cell + 0.5) / binHz;
    const centre = hertzOfCell(cell) / binHz;
    const widthBins = high - low;
    const isWide = widthBins > 1;
    pooling.firstBin[index] = isWide ? Math.ceil(low - 0.25) : Math.floor(centre);
    pooling.endBin[index] = isWide ? Math.floor(high + 0.25) + 1 : Math.floor(centre);
    pooling.fraction[index] = centre - Math.floor(centre);
    const independent = Math.max(1, widthBins / INDEPENDENT_BINS);
    // Expected maximum of m exponential variables, in nepers above their mean log.
    pooling.threshold[index] =
      MARGIN_NEPERS + MEAN_LOG_BIAS_NEPERS + Math.log(Math.max(1, Math.log(independent) + MEAN_LOG_BIAS_NEPERS));
  }
  return pooling;
}

/** Level of one cell, nepers above the floor. */
export function pooledLevel(pooling: CellPooling, levels: Float32Array, index: number): number {
  const first = pooling.firstBin[index] as number;
  const end = pooling.endBin[index] as number;
  if (end === first) {
    const below = levels[first] as number;
    return below + (pooling.fraction[index] as number) * ((levels[first + 1] as number) - below);
  }
  let highest = levels[first] as number;
  for (let bin = first + 1; bin < end; bin++) highest = Math.max(highest, levels[bin] as number);
  return highest;
}
