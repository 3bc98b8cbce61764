import { clock } from '../clock.ts';
import { logger } from '../logger.ts';
import { type FeedEvent, listEventsAfter, listNewestIds } from '../models/outboxFeed.ts';
import { type Credential, listReaderRights } from '../models/readerRights.ts';
import { roleHasAbility } from '../policies/abilities.ts';

/** Half of this is the mean delay of an update; two queries a second serve every stream of the process. */
const POLL_MILLISECONDS = 500;
/** A stream outlives the end of its sign-in, or of a role, by at most this. */
const RIGHTS_CHECK_SECONDS = 10;
/**
 * Ids are given when a row is written and seen when its transaction commits, so a lower id may appear after a
 * higher one. No transaction lasts longer than this: lock waits end after 4 s, statements after 20 s.
 */
const LATE_COMMIT_SECONDS = 30;
const START_OVERLAP_COUNT = 200;
const BATCH_COUNT = 1000;

export interface FeedListener {
  readonly credential: Credential;
  /** Called with the events of benches that the listener may read. */
  readonly onEvents: (events: readonly FeedEvent[]) => void;
  /** The sign-in or the token has ended, or no bench is left. Called at most once. */
  readonly onEnd: () => void;
}

/** One look at the outbox for all open streams of this process; none while nobody listens. */
class UpdatesFeed {
  /** Listener → the benches it may read. */
  readonly #listeners = new Map<FeedListener, ReadonlySet<string>>();
  /** Ids above the floor that were handed on, with the time of it. */
  #seenAtSeconds = new Map<number, number>();
  /** Everything up to here is settled. */
  #floorId = 0;
  #beginning: Promise<void> | null = null;
  #timer: NodeJS.Timeout | null = null;
  #rightsCheckedSeconds = 0;
  #isFailing = false;

  /**
   * Resolves when nothing that is committed from now on can be missed.
   *
   * @returns a function that ends the listening; calling it again does nothing
   */
  async listen(listener: FeedListener, benchIds: readonly string[]): Promise<() => void> {
    const stop = () => {
      this.#listeners.delete(listener);
      if (this.#listeners.size === 0) this.#stop();
    };
    this.#listeners.set(listener, new Set(benchIds));
    try {
      this.#beginning ??= this.#begin();
      await this.#beginning;
    } catch (error) {
      this.#beginning = null;
      stop();
      throw error;
    }
    return stop;
  }

  /** What is there already is not news; what was begun before and commits later is. */
  async #begin(): Promise<void> {
    const ids = await listNewestIds(START_OVERLAP_COUNT);
    const now = clock.monotonicSeconds();
    this.#seenAtSeconds = new Map(ids.reverse().map((id) => [id, now]));
    this.#floorId = (ids[0] ?? 1) - 1;
    this.#rightsCheckedSeconds = now;
    if (this.#listeners.size > 0) this.#schedule();
  }

  #stop(): void {
    if (this.#timer !== null) clearTimeout(this.#timer);
    this.#timer = null;
    this.#beginning = null;
  }

  #schedule(): void {
    const timer = setTimeout(() => {
      void this.#turn().finally(() => {
        // Stopped, and perhaps started anew, while the queries ran.
        if (this.#timer === timer) this.#schedule();
      });
    }, POLL_MILLISECONDS);
    this.#timer = timer;
  }

  async #turn(): Promise<void> {
    try {
      await this.#poll();
      if (clock.monotonicSeconds() - this.#rightsCheckedSeconds >= RIGHTS_CHECK_SECONDS) await this.#checkRights();
      this.#isFailing = false;
    } catch (error) {
      // One line an outage; the streams stay open and go on where they were.
      if (!this.#isFailing) logger().warn({ err: error }, 'the updates feed cannot read the database');
      this.#isFailing = true;
    }
  }

  async #poll(): Promise<void> {
    const events = await listEventsAfter(this.#floorId, BATCH_COUNT);
    const now = clock.monotonicSeconds();
    const fresh = events.filter(({ id }) => !this.#seenAtSeconds.has(id));
    for (const { id } of fresh) this.#seenAtSeconds.set(id, now);
    this.#settle(now);
    if (fresh.length === 0) return;
    for (const [listener, benchIds] of this.#listeners) {
      const readable = fresh.filter(({ benchId }) => benchIds.has(benchId));
      if (readable.length > 0) listener.onEvents(readable);
    }
  }

  /** Raises the floor over ids so old that nothing can appear below them any more. */
  #settle(now: number): void {
    for (const [id, seenSeconds] of this.#seenAtSeconds) {
      if (now - seenSeconds < LATE_COMMIT_SECONDS) break;
      this.#seenAtSeconds.delete(id);
      this.#floorId = Math.max(this.#floorId, id);
    }
  }

  async #checkRights(): Promise<void> {
    const rights = await listReaderRights([...this.#listeners.keys()].map(({ credential }) => credential));
    const benchIdsByKey = new Map<string, Set<string>>();
    for (const { benchId, role, ...credential } of rights) {
      if (!roleHasAbility(role, 'read')) continue;
      const key = keyOf(credential);
      benchIdsByKey.set(key, (benchIdsByKey.get(key) ?? new Set()).add(benchId));
    }
    for (const listener of this.#listeners.keys()) {
      const benchIds = benchIdsByKey.get(keyOf(listener.credential));
      if (benchIds !== undefined) this.#listeners.set(listener, benchIds);
      else listener.onEnd();
    }
    this.#rightsCheckedSeconds = clock.monotonicSeconds();
  }
}

function keyOf({ via, secretHash }: Credential): string {
  return `${via} ${secretHash.toString('hex')}`;
}

export const updatesFeed = new UpdatesFeed();
