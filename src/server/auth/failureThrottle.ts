/** Failures of one kind that are remembered for one key: an account's address, or the address of a caller. */
interface Entry {
  failureCount: number;
  /** Monotonic time from which the next attempt is allowed. */
  openAtSeconds: number;
  /** Monotonic time after which the failures are forgotten. */
  forgetAtSeconds: number;
}

interface ThrottleRules {
  /** How long failures are remembered after the last (or first) one. */
  readonly memorySeconds: number;
  /** @returns how long the next attempt must wait after this many failures, s. */
  readonly delaySecondsAfter: (failureCount: number) => number;
  /** Whether every failure starts the memory anew; otherwise the first one opens a fixed window. */
  readonly isMemoryRenewed: boolean;
}

/** Beyond this many keys the oldest are forgotten: an attacker must not fill the memory with invented ones. */
const KEY_MAXIMUM_COUNT = 20_000;

/**
 * Slows guessing down. Lives in the memory of the one web process: a restart forgives, which costs an attacker
 * more than it gives. `nowSeconds` is monotonic time.
 */
export function createFailureThrottle(rules: ThrottleRules) {
  const entries = new Map<string, Entry>();

  function entryOf(key: string, nowSeconds: number): Entry | undefined {
    const entry = entries.get(key);
    if (entry === undefined || entry.forgetAtSeconds > nowSeconds) return entry;
    entries.delete(key);
    return undefined;
  }

  return {
    /** @returns how long this key must still wait; 0 when it may try now, s. */
    waitSeconds(key: string, nowSeconds: number): number {
      return Math.max(0, (entryOf(key, nowSeconds)?.openAtSeconds ?? 0) - nowSeconds);
    },

    noteFailure(key: string, nowSeconds: number): void {
      const before = entryOf(key, nowSeconds);
      const failureCount = (before?.failureCount ?? 0) + 1;
      const isWindowKept = before !== undefined && !rules.isMemoryRenewed;
      const forgetAtSeconds = isWindowKept ? before.forgetAtSeconds : nowSeconds + rules.memorySeconds;
      const openAtSeconds = Math.min(nowSeconds + rules.delaySecondsAfter(failureCount), forgetAtSeconds);
      entries.delete(key);
      entries.set(key, { failureCount, openAtSeconds, forgetAtSeconds });
      const [oldest] = entries.keys();
      if (entries.size > KEY_MAXIMUM_COUNT && oldest !== undefined) entries.delete(oldest);
    },

    noteSuccess(key: string): void {
      entries.delete(key);
    },
  };
}
