interface Counts {
  /** Recordings of the last 24 hours. */
  readonly cameInCount: number;
  readonly needsPersonCount: number;
}

/**
 * The one sentence that the home page is about.
 *
 * @example todaySentence({ cameInCount: 14, needsPersonCount: 3 }) // '14 recordings came in since yesterday; 3 need a person.'
 */
export function todaySentence({ cameInCount, needsPersonCount }: Counts): string {
  return `${cameIn(cameInCount)} since yesterday; ${needsPerson(needsPersonCount)}.`;
}

function cameIn(count: number): string {
  if (count === 0) return 'No recording came in';
  return count === 1 ? 'One recording came in' : `${String(count)} recordings came in`;
}

function needsPerson(count: number): string {
  if (count === 0) return 'none needs a person';
  return count === 1 ? 'one needs a person' : `${String(count)} need a person`;
}
