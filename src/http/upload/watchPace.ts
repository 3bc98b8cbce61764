import { clock } from '#server/clock.ts';

/** Slower than this over a whole window is a client that holds a place and sends nothing to speak of. */
const MINIMUM_BYTES_PER_SECOND = 256;
const WINDOW_SECONDS = 60;
const CHECKS_PER_WINDOW = 12;

interface WatchPaceOptions {
  /** Bytes received since the start; may only grow. */
  readonly receivedBytes: () => number;
  /** Called once. */
  readonly onTooSlow: () => void;
  readonly windowSeconds?: number;
}

/**
 * Watches how fast bytes come in, by the monotonic clock.
 *
 * @returns a function that ends the watch
 */
export function watchPace({ receivedBytes, onTooSlow, windowSeconds = WINDOW_SECONDS }: WatchPaceOptions): () => void {
  const marks = [{ seconds: clock.monotonicSeconds(), bytes: receivedBytes() }];
  const timer = setInterval(
    () => {
      const now = { seconds: clock.monotonicSeconds(), bytes: receivedBytes() };
      marks.push(now);
      // The newest mark that is a whole window old is the start of the window.
      while ((marks[1]?.seconds ?? now.seconds) <= now.seconds - windowSeconds) marks.shift();
      const start = marks[0] ?? now;
      const elapsedSeconds = now.seconds - start.seconds;
      if (elapsedSeconds < windowSeconds) return;
      if ((now.bytes - start.bytes) / elapsedSeconds >= MINIMUM_BYTES_PER_SECOND) return;
      clearInterval(timer);
      onTooSlow();
    },
    (windowSeconds * 1000) / CHECKS_PER_WINDOW,
  );
  timer.unref();
  return () => {
    clearInterval(timer);
  };
}
