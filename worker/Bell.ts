import { EventEmitter, once } from 'node:events';
import { setTimeout as pause } from 'node:timers/promises';

/**
 * Wakes the idle slots of this worker. A ring counts even when nobody sleeps yet: whoever looked into the queue
 * before the ring and found it empty does not fall asleep after it.
 */
export class Bell {
  readonly #emitter = new EventEmitter().setMaxListeners(0);
  #ringCount = 0;

  /** Grows with each ring; note it before looking for work. */
  get ringCount(): number {
    return this.#ringCount;
  }

  ring(): void {
    this.#ringCount += 1;
    this.#emitter.emit('ring');
  }

  /** Sleeps until the next ring after `heardCount` rings, but no longer than `limitSeconds`. */
  async sleep(heardCount: number, limitSeconds: number): Promise<void> {
    if (heardCount !== this.#ringCount) return;
    const awake = new AbortController();
    const { signal } = awake;
    try {
      await Promise.race([once(this.#emitter, 'ring', { signal }), pause(limitSeconds * 1000, undefined, { signal })]);
    } finally {
      awake.abort();
    }
  }
}
