import { useSyncExternalStore } from 'react';

/**
 * The speed that the evidence on this page is held against: the reading's own (null), a candidate that someone looks
 * at, or wherever the rack was moved. One page shows one recording, so the islands share this one value.
 */
let shownRpm: number | null = null;
const listeners = new Set<() => void>();

export function showSpeed(rpm: number | null): void {
  shownRpm = rpm;
  for (const listener of listeners) listener();
}

/** The speed being looked at; null is the reading's own. */
export function useShownSpeed(): number | null {
  return useSyncExternalStore(
    subscribe,
    () => shownRpm,
    () => null,
  );
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}
