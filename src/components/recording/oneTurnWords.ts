/** Bumps that differ by more than this part of their mean are heard as uneven. */
const UNEVEN_FROM_FRACTION = 0.2;

/**
 * Whether the bumps of one turn are alike.
 *
 * @param level mean 1, one turn, shape [pointCount]
 * @param eventsPerTurn bumps to expect in the turn
 * @returns the difference between the highest and the lowest bump as a fraction of their mean, and its word;
 *   null when there are fewer than two bumps or too few points for them
 */
export function evenness(
  level: readonly (number | null)[],
  eventsPerTurn: number,
): { word: 'even' | 'uneven contacts'; spreadFraction: number } | null {
  const LEAST_POINTS_IN_BUMP = 4;
  if (!Number.isInteger(eventsPerTurn) || eventsPerTurn < 2 || level.length < eventsPerTurn * LEAST_POINTS_IN_BUMP) {
    return null;
  }
  const heights = Array.from({ length: eventsPerTurn }, (_, part) => {
    const from = Math.floor((part * level.length) / eventsPerTurn);
    const to = Math.floor(((part + 1) * level.length) / eventsPerTurn);
    return Math.max(...level.slice(from, to).map((value) => value ?? 0));
  });
  const mean = heights.reduce((sum, height) => sum + height, 0) / heights.length;
  const spreadFraction = mean > 0 ? (Math.max(...heights) - Math.min(...heights)) / mean : 0;
  return { word: spreadFraction < UNEVEN_FROM_FRACTION ? 'even' : 'uneven contacts', spreadFraction };
}
