import { API_BASE_PATH } from '#client/api/request.ts';
import { updateEvent, type UpdateEvent } from '#lib/schemas/update.ts';

/** Pause before a lost stream is opened again; with the answer's own time the page shows the truth within 5 s. */
export const REOPEN_AFTER_MILLISECONDS = 2000;

export type StreamState = 'connecting' | 'live' | 'lost';

export interface UpdatesListener {
  readonly onChange?: (event: UpdateEvent) => void;
  /** The stream is back after a gap: whatever changed meanwhile was not heard. */
  readonly onGap?: () => void;
  readonly onState?: (state: StreamState) => void;
}

/**
 * The page's one connection to server-sent updates. It is open while somebody listens.
 *
 * The browser's own reconnection gives up on an error answer and waits differently in every browser, so
 * a broken source is closed and a new one opened here; missed events need no replay because a gap makes
 * listeners fetch the truth.
 */
class UpdatesStream {
  #source: EventSource | null = null;
  #timer: ReturnType<typeof setTimeout> | null = null;
  #hasGap = false;
  #state: StreamState = 'connecting';
  readonly #listeners = new Set<UpdatesListener>();

  get state(): StreamState {
    return this.#state;
  }

  /** @returns a function that ends the listening */
  listen(listener: UpdatesListener): () => void {
    this.#listeners.add(listener);
    if (this.#listeners.size === 1) this.#open();
    return () => {
      this.#listeners.delete(listener);
      if (this.#listeners.size === 0) this.#close();
    };
  }

  readonly #reopen = () => {
    this.#hasGap = true;
    this.#disconnect();
    this.#open();
  };

  #open(): void {
    const source = new EventSource(`${API_BASE_PATH}/updates`);
    this.#source = source;
    source.addEventListener('open', () => {
      this.#setState('live');
      if (this.#hasGap) for (const listener of this.#listeners) listener.onGap?.();
      this.#hasGap = false;
    });
    source.addEventListener('change', (message: MessageEvent<string>) => {
      const event = parseEvent(message.data);
      if (event) for (const listener of this.#listeners) listener.onChange?.(event);
    });
    source.addEventListener('error', () => {
      this.#setState('lost');
      this.#disconnect();
      this.#timer = setTimeout(this.#reopen, REOPEN_AFTER_MILLISECONDS);
    });
    window.addEventListener('online', this.#reopen, { once: true });
  }

  #disconnect(): void {
    this.#source?.close();
    this.#source = null;
    if (this.#timer !== null) clearTimeout(this.#timer);
    this.#timer = null;
    window.removeEventListener('online', this.#reopen);
  }

  #close(): void {
    this.#disconnect();
    this.#hasGap = false;
    this.#state = 'connecting';
  }

  #setState(state: StreamState): void {
    this.#state = state;
    for (const listener of this.#listeners) listener.onState?.(state);
  }
}

export const updatesStream = new UpdatesStream();

/** An event of a newer server that this page does not know is passed over. */
function parseEvent(text: string): UpdateEvent | null {
  try {
    const parsed = updateEvent.safeParse(JSON.parse(text));
    return parsed.success ? parsed.data : null;
  } catch {
    return null;
  }
}
