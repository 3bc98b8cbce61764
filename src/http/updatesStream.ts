import type { APIContext } from 'astro';
import { hashOfSecret } from '#server/auth/secrets.ts';
import type { FeedEvent } from '#server/models/outboxFeed.ts';
import type { Credential } from '#server/models/readerRights.ts';
import { listEventsOfBenches } from '#server/models/outboxFeed.ts';
import { readableBenchIds } from '#server/policies/abilities.ts';
import type { Actor } from '#server/policies/actor.ts';
import { updatesFeed } from '#server/usecases/updatesFeed.ts';
import { bearerToken } from './bearerToken.ts';

/** Proxies and phones drop a connection on which nothing moves. */
const COMMENT_MILLISECONDS = 15_000;
const RETRY_MILLISECONDS = 2000;
const REPLAY_MAXIMUM_COUNT = 1000;
/** A reader that is so far behind reconnects and fetches the truth instead. */
const UNREAD_MAXIMUM_CHUNKS = 500;

/**
 * Server-sent events of the benches that the actor may read, from now on or from after `Last-Event-ID`. An event says
 * only that something changed, so one that comes twice does no harm.
 */
export async function updatesStream(context: APIContext, actor: Actor): Promise<ReadableStream<Uint8Array>> {
  const stream = new EventStream(context.request.signal);
  const benchIds = readableBenchIds(actor);
  const { onEvents, onEnd } = stream;
  stream.onStop(await updatesFeed.listen({ credential: credentialOf(context), onEvents, onEnd }, benchIds));
  try {
    stream.send(`retry: ${String(RETRY_MILLISECONDS)}\n\n`);
    onEvents(await listMissed(context.request.headers.get('last-event-id'), benchIds));
    return stream.readable;
  } catch (error) {
    stream.stop();
    throw error;
  }
}

class EventStream {
  readonly readable: ReadableStream<Uint8Array>;
  readonly #encoder = new TextEncoder();
  readonly #cleanups: (() => void)[] = [];
  #controller: ReadableStreamDefaultController<Uint8Array> | null = null;

  constructor(signal: AbortSignal) {
    this.readable = new ReadableStream({
      start: (controller) => {
        this.#controller = controller;
      },
      cancel: this.stop,
    });
    const commentTimer = setInterval(() => {
      this.send(': still here\n\n');
    }, COMMENT_MILLISECONDS);
    this.onStop(() => {
      clearInterval(commentTimer);
    });
    signal.addEventListener('abort', this.stop, { once: true });
  }

  /** Runs `cleanup` when the stream stops, at once if it has. */
  onStop(cleanup: () => void): void {
    if (this.#controller === null) cleanup();
    else this.#cleanups.push(cleanup);
  }

  send(text: string): void {
    this.#controller?.enqueue(this.#encoder.encode(text));
    if ((this.#controller?.desiredSize ?? 0) < -UNREAD_MAXIMUM_CHUNKS) this.onEnd();
  }

  readonly onEvents = (events: readonly FeedEvent[]): void => {
    if (events.length > 0) this.send(events.map(eventText).join(''));
  };

  readonly onEnd = (): void => {
    const controller = this.#controller;
    this.stop();
    controller?.close();
  };

  /** Both the cancelled stream and the aborted request say that the reader has gone, in any order. */
  readonly stop = (): void => {
    this.#controller = null;
    for (const cleanup of this.#cleanups.splice(0)) cleanup();
  };
}

function listMissed(lastEventId: string | null, benchIds: readonly string[]): Promise<FeedEvent[]> {
  if (lastEventId === null || !/^\d{1,15}$/.test(lastEventId)) return Promise.resolve([]);
  return listEventsOfBenches(benchIds, { afterId: Number(lastEventId), limit: REPLAY_MAXIMUM_COUNT });
}

function eventText({ id, payload }: FeedEvent): string {
  return `event: change\nid: ${String(id)}\ndata: ${JSON.stringify(payload)}\n\n`;
}

function credentialOf({ request, locals }: APIContext): Credential {
  const token = bearerToken(request);
  if (token !== null) return { via: 'token', secretHash: hashOfSecret(token) };
  return { via: 'session', secretHash: hashOfSecret(locals.authSession?.id ?? '') };
}
