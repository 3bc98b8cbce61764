import type { Readable } from 'node:stream';

/** How long a refused client may go on sending, so that it reads the refusal instead of a broken connection. */
const LINGER_SECONDS = 10;

/** Throws away what still comes of a body that was refused, for a while, then ends the connection. */
export function linger(source: Readable): void {
  const timer = setTimeout(() => source.destroy(), LINGER_SECONDS * 1000);
  timer.unref();
  source.once('close', () => {
    clearTimeout(timer);
  });
  source.on('error', () => undefined);
  source.resume();
}
