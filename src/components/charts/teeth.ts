import { firstIndexFrom } from './plotRange.ts';

/** One tooth of the rack: a multiple of the event rate, and what the spectrum has there. */
export interface Tooth {
  /** 1, 2, 3 … */
  readonly multiple: number;
  readonly position: number;
  /** Highest level near the tooth, dB above the floor; null beyond the spectrum or in a gap. */
  readonly levelDecibels: number | null;
  readonly isFound: boolean;
}

/**
 * A line counts as found from here on. The highest of the rows that a tooth reaches lies 10 dB above the floor in white
 * noise already, and 13 dB at one place in a hundred.
 */
const FOUND_FROM_DECIBELS = 14;
/** A line may lie this fraction beside its tooth: the speed moves a little while it is averaged. */
const REACH_FRACTION = 0.005;
/** … but at least this many rows, for a line is as wide as its window. */
const REACH_ROWS = 1.5;
/** More teeth than this are nobody's proof. */
const MOST_TEETH = 400;

/**
 * The teeth of a rack over a spectrum, from the first multiple up to the end of the spectrum.
 *
 * @param positions ascending, shape [rowCount]
 * @param levels dB above the floor, shape [rowCount]
 * @param spacing distance of two teeth in the unit of `positions`, > 0
 */
export function teethOver(
  positions: readonly number[],
  levels: readonly (number | null)[],
  spacing: number,
): readonly Tooth[] {
  const end = positions.at(-1) ?? 0;
  const count = spacing > 0 ? Math.min(MOST_TEETH, Math.floor(end / spacing)) : 0;
  const rowWidth = ((end - (positions[0] ?? 0)) / Math.max(1, positions.length - 1)) * REACH_ROWS;
  return Array.from({ length: count }, (_, index) => {
    const position = spacing * (index + 1);
    const levelDecibels = highestLevel(positions, levels, position, Math.max(rowWidth, position * REACH_FRACTION));
    return {
      multiple: index + 1,
      position,
      levelDecibels,
      isFound: levelDecibels !== null && levelDecibels >= FOUND_FROM_DECIBELS,
    };
  });
}

function highestLevel(
  positions: readonly number[],
  levels: readonly (number | null)[],
  position: number,
  reach: number,
): number | null {
  let highest: number | null = null;
  for (let row = firstIndexFrom(positions, position - reach); row < positions.length; row += 1) {
    if ((positions[row] ?? Infinity) > position + reach) break;
    const level = levels[row] ?? null;
    if (level !== null && (highest === null || level > highest)) highest = level;
  }
  return highest;
}
