/** Most rows of a spectrum that is stored and drawn. */
export const MOST_SPECTRUM_ROWS = 8192;

/** Columns of a line spectrum with at most `MOST_SPECTRUM_ROWS` rows. */
export interface SpectrumRows {
  readonly positions: Float32Array;
  readonly levels: Float32Array;
}

/**
 * Thins a spectrum by keeping the highest bin of each group at its own place, so that no line is lost or moved.
 *
 * @param levels shape [binCount]
 * @param options position of bin b is b · `step`; bins from `firstBin` up to but without `endBin` are used
 */
export function decimateSpectrum(
  levels: Float32Array,
  options: {
    readonly step: number;
    readonly firstBin: number;
    readonly endBin: number;
  },
): SpectrumRows {
  const { step, firstBin } = options;
  const endBin = Math.min(options.endBin, levels.length);
  const group = Math.max(1, Math.ceil((endBin - firstBin) / MOST_SPECTRUM_ROWS));
  const count = Math.max(0, Math.ceil((endBin - firstBin) / group));
  const positions = new Float32Array(count);
  const kept = new Float32Array(count);
  for (let row = 0; row < count; row++) {
    let best = firstBin + row * group;
    for (let bin = best + 1; bin < Math.min(endBin, firstBin + (row + 1) * group); bin++) {
      if ((levels[bin] as number) > (levels[best] as number)) best = bin;
    }
    positions[row] = best * step;
    kept[row] = levels[best] as number;
  }
  return { positions, levels: kept };
}
