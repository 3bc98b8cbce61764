import type { OrderLevels } from './orderLevels.ts';

/** One line that stands out. */
export interface OrderPeak {
  readonly order: number;
  /** Nepers above the noise floor. */
  readonly level: number;
}

/**
 * The strongest local maxima of an order spectrum.
 *
 * @param options lines below `leastLevel` nepers are left out; at most `most` are returned, strongest first
 */
export function orderPeaks(
  spectrum: OrderLevels,
  options: { readonly leastLevel: number; readonly most: number },
): OrderPeak[] {
  const { levels, ordersPerBin } = spectrum;
  const reach = Math.ceil(2 * spectrum.resolutionBins);
  const peaks: OrderPeak[] = [];
  const first = Math.ceil(spectrum.lowestOrder / ordersPerBin);
  const last = Math.min(levels.length - 1, Math.floor(spectrum.highestOrder / ordersPerBin));
  for (let bin = first; bin <= last; bin++) {
    const level = levels[bin] as number;
    if (level < options.leastLevel || !isHighestNear(levels, bin, reach)) continue;
    peaks.push({ order: bin * ordersPerBin, level });
  }
  return peaks.sort((a, b) => b.level - a.level).slice(0, options.most);
}

function isHighestNear(levels: Float32Array, bin: number, reach: number): boolean {
  const level = levels[bin] as number;
  for (let other = Math.max(0, bin - reach); other <= Math.min(levels.length - 1, bin + reach); other++) {
    const otherLevel = levels[other] as number;
    if (otherLevel > level || (otherLevel === level && other < bin)) return false;
  }
  return true;
}
