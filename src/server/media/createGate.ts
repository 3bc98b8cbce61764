/** Runs a task when one of the places is free; the others wait in the order they came. */
export type Gate = <Result>(task: () => Promise<Result>) => Promise<Result>;

/**
 * Bounds how many tasks run at once, so that a burst of uploads cannot slow each of them past its time limit.
 *
 * @param placeCount tasks at once, ≥ 1
 */
export function createGate(placeCount: number): Gate {
  const waiting: (() => void)[] = [];
  let freePlaces = placeCount;
  return async (task) => {
    if (freePlaces > 0) freePlaces--;
    else await new Promise<void>((enter) => waiting.push(enter));
    try {
      return await task();
    } finally {
      const next = waiting.shift();
      if (next) next();
      else freePlaces++;
    }
  };
}
