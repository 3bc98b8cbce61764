import { useEffect, useState } from 'react';

const KEY_PREFIX = 'ripplebench.seen.';

/**
 * Remembers on this device what a person has seen of a thing.
 *
 * @param thing the id of what is looked at
 * @param latest the newest mark, for example the id of the newest recording; null when there is none
 * @returns whether `latest` is new since the last visit; true until the device was asked
 */
export function useSeenMark(thing: string, latest: string | null): boolean {
  const [seen, setSeen] = useState<string | null>(null);

  useEffect(() => {
    setSeen(readMark(thing));
  }, [thing]);

  useEffect(() => {
    if (latest === null) return undefined;
    const remember = () => {
      writeMark(thing, latest);
    };
    window.addEventListener('pagehide', remember);
    return () => {
      window.removeEventListener('pagehide', remember);
    };
  }, [thing, latest]);

  return latest !== null && seen !== latest;
}

/** A browser that keeps nothing shows the newest as new each time. */
function readMark(thing: string): string | null {
  try {
    return localStorage.getItem(KEY_PREFIX + thing);
  } catch {
    return null;
  }
}

function writeMark(thing: string, mark: string): void {
  try {
    localStorage.setItem(KEY_PREFIX + thing, mark);
  } catch {
    // Full or forbidden storage costs a colour, nothing else.
  }
}
