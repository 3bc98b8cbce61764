import { ApiError, unreachableError } from '#client/api/ApiError.ts';
import type { UploadedRecording, UploadOptions } from '#client/api/uploadRecording.ts';
import type { UploadFields } from '#lib/schemas/recording.ts';
import { isUnfinished, type Upload, type UploadState } from './upload.ts';

/** Files on their way at once: more would only slow each other down on a phone's uplink. */
export const SIMULTANEOUS_MAXIMUM_COUNT = 2;
const FIRST_PAUSE_SECONDS = 1;
const LONGEST_PAUSE_SECONDS = 30;
const MILLISECONDS_PER_SECOND = 1000;

interface UploadQueueParts {
  readonly send: (options: UploadOptions) => Promise<UploadedRecording>;
  readonly createKey: () => string;
  /** What is already known to be refused is not sent. */
  readonly refusalBeforeSending: (file: File) => ApiError | null;
}

/**
 * The files that this page is sending, in the order in which they were added.
 *
 * A file that the server refuses stays with the refusal; one that broke off is sent again with the same
 * key after a pause that doubles, or at once when the network is back.
 */
export class UploadQueue {
  readonly #parts: UploadQueueParts;
  readonly #running = new Map<string, AbortController>();
  readonly #timers = new Map<string, ReturnType<typeof setTimeout>>();
  readonly #subscribers = new Set<() => void>();
  #uploads: readonly Upload[] = [];

  constructor(parts: UploadQueueParts) {
    this.#parts = parts;
  }

  /** Every change makes a new array, and a new object for each upload that changed. */
  readonly snapshot = (): readonly Upload[] => this.#uploads;

  readonly subscribe = (onChange: () => void): (() => void) => {
    this.#subscribers.add(onChange);
    return () => this.#subscribers.delete(onChange);
  };

  add(files: readonly File[], fields: UploadFields): void {
    const added = files.map((file): Upload => {
      const error = this.#parts.refusalBeforeSending(file);
      const state: UploadState = error ? { phase: 'refused', error } : { phase: 'waiting' };
      return { key: this.#parts.createKey(), file, fields, state, brokenAttemptCount: 0 };
    });
    this.#replace([...this.#uploads, ...added]);
    this.#startWaiting();
  }

  cancel(key: string): void {
    this.#update(key, { state: { phase: 'cancelled' } });
    this.#running.get(key)?.abort();
    this.#clearTimer(key);
  }

  retry(key: string): void {
    this.#clearTimer(key);
    this.#update(key, { state: { phase: 'waiting' }, brokenAttemptCount: 0 });
    this.#startWaiting();
  }

  /** Everything that paused goes on at once: the network is back. */
  resume(): void {
    for (const { key, state } of this.#uploads) if (state.phase === 'paused') this.retry(key);
  }

  /** Takes a line off the list; what is still unfinished stays. */
  dismiss(key: string): void {
    this.#replace(this.#uploads.filter((upload) => upload.key !== key || isUnfinished(upload)));
  }

  #startWaiting(): void {
    for (const upload of this.#uploads) {
      if (this.#running.size >= SIMULTANEOUS_MAXIMUM_COUNT) return;
      if (upload.state.phase === 'waiting' && !this.#running.has(upload.key)) void this.#run(upload);
    }
  }

  async #run({ key, file, fields }: Upload): Promise<void> {
    const abort = new AbortController();
    this.#running.set(key, abort);
    this.#update(key, { state: { phase: 'sending', sentBytes: 0 } });
    try {
      const recording = await this.#parts.send({
        file,
        fields,
        idempotencyKey: key,
        signal: abort.signal,
        onProgress: ({ sentBytes }) => {
          if (!abort.signal.aborted) {
            this.#update(key, { state: { phase: 'sending', sentBytes: Math.min(sentBytes, file.size) } });
          }
        },
      });
      // Also when it was cancelled in the instant of its answer: the recording exists.
      this.#update(key, {
        state: { phase: 'received', recordingId: recording.id, duplicateOf: recording.duplicateOf },
      });
    } catch (error) {
      if (!abort.signal.aborted) this.#fail(key, error instanceof ApiError ? error : unreachableError(error));
    } finally {
      this.#running.delete(key);
      this.#startWaiting();
    }
  }

  #fail(key: string, error: ApiError): void {
    if (!error.isTransient) {
      this.#update(key, { state: { phase: 'refused', error } });
      return;
    }
    const brokenAttemptCount = (this.#find(key)?.brokenAttemptCount ?? 0) + 1;
    const pauseSeconds = Math.min(FIRST_PAUSE_SECONDS * 2 ** (brokenAttemptCount - 1), LONGEST_PAUSE_SECONDS);
    this.#update(key, { state: { phase: 'paused', error, pauseSeconds }, brokenAttemptCount });
    const goOn = () => {
      this.#timers.delete(key);
      this.#update(key, { state: { phase: 'waiting' } });
      this.#startWaiting();
    };
    this.#timers.set(key, setTimeout(goOn, pauseSeconds * MILLISECONDS_PER_SECOND));
  }

  #find(key: string): Upload | undefined {
    return this.#uploads.find((upload) => upload.key === key);
  }

  #update(key: string, changes: Partial<Pick<Upload, 'state' | 'brokenAttemptCount'>>): void {
    this.#replace(this.#uploads.map((upload) => (upload.key === key ? { ...upload, ...changes } : upload)));
  }

  #replace(uploads: readonly Upload[]): void {
    this.#uploads = uploads;
    for (const onChange of this.#subscribers) onChange();
  }

  #clearTimer(key: string): void {
    const timer = this.#timers.get(key);
    if (timer !== undefined) clearTimeout(timer);
    this.#timers.delete(key);
  }
}
