/**
 * The only clock of the server. Leases and tokens are judged by database time; this one stamps log lines and
 * measures time-outs.
 */
export const clock = {
  now: (): Date => new Date(),
  /** Seconds since an arbitrary start; never jumps when the wall clock is set. */
  monotonicSeconds: (): number => Number(process.hrtime.bigint()) / 1e9,
};
