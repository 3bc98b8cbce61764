/** Largest numerator and denominator of the plain ratios. */
const LARGEST_PLAIN = 6;
/** Largest divisor that turns a track of single events into one of turns when k is unknown to the track. */
const LARGEST_DIVISOR = 8;
const LARGEST_EVENT_DIVISOR = 40;
/** Ratios nearer than this are one. */
const SAME_RATIO = 1e-6;

/**
 * Ratios of the true event rate to the tracked one that a comb can be mistaken by.
 *
 * A comb that follows every second event, two events at once, or the shaft instead of its events, moves with the
 * true rate all the time; only its ratio is wrong.
 *
 * @param eventsPerTurn k > 0
 * @returns distinct ratios, 1 first
 */
export function ratioHypotheses(eventsPerTurn: number): number[] {
  const ratios: number[] = [1];
  const add = (ratio: number) => {
    if (!ratios.some((known) => Math.abs(known / ratio - 1) < SAME_RATIO)) ratios.push(ratio);
  };
  for (let numerator = 1; numerator <= LARGEST_PLAIN; numerator++) {
    for (let denominator = 1; denominator <= LARGEST_PLAIN; denominator++) add(numerator / denominator);
  }
  const most = Math.min(LARGEST_EVENT_DIVISOR, Math.ceil(3 * eventsPerTurn));
  for (let divisor = 1; divisor <= most; divisor++) {
    add(eventsPerTurn / divisor);
    add(divisor / eventsPerTurn);
  }
  for (let divisor = 1; divisor <= LARGEST_DIVISOR; divisor++) add(1 / divisor);
  return ratios;
}
