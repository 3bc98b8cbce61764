import { once } from 'node:events';
import { setTimeout as pause } from 'node:timers/promises';
import { Worker } from 'node:worker_threads';
import type { AnalysisOutcome, AnalysisTask, FromThread, ToThread } from './messages.ts';

/** Objects of the engine; sample arrays lie outside this heap and are capped by the decoder. */
const HEAP_LIMIT_MEGABYTES = 512;
/** Time for an aborted decoder to end its child process before the thread is taken down. */
const ABORT_GRACE_MILLISECONDS = 200;

const ignore = (): void => undefined;

/**
 * One warm thread that runs one task at a time. Whatever a file does to the thread, `run` answers, and a fresh
 * thread stands ready for the next task.
 */
export class AnalysisThread {
  readonly #entry: URL;
  #started: Promise<Worker> | null;

  /** @param entry the bundled worker/threads/analyse.ts */
  constructor(entry: URL) {
    this.#entry = entry;
    this.#started = this.#start();
  }

  /** @throws Error when the thread cannot load its code */
  async ready(): Promise<void> {
    await this.#started;
  }

  /**
   * @param signal ends the work and the thread with it
   * @returns `crashed` when the thread died of the task: memory, a native fault, an uncaught error
   * @throws the reason of `signal`; Error when the thread did not even start, for which no file is to blame
   */
  async run(task: AnalysisTask, signal?: AbortSignal): Promise<AnalysisOutcome> {
    this.#started ??= this.#start();
    const worker = await this.#started;
    signal?.throwIfAborted();
    const settled = new AbortController();
    try {
      send(worker, { kind: 'task', task });
      return await Promise.race([
        answerOf(worker, settled.signal),
        ...(signal ? [rejectionOf(signal, settled.signal)] : []),
      ]);
    } catch (error) {
      await this.#replace(worker);
      if (signal?.aborted) throw signal.reason;
      return { kind: 'crashed', cause: error instanceof Error ? error.message : String(error) };
    } finally {
      settled.abort();
    }
  }

  async close(): Promise<void> {
    const started = this.#started;
    this.#started = null;
    const worker = await started?.catch(ignore);
    await worker?.terminate();
  }

  #start(): Promise<Worker> {
    const worker = new Worker(this.#entry, { resourceLimits: { maxOldGenerationSizeMb: HEAP_LIMIT_MEGABYTES } });
    const started = nextMessage(worker).then(() => worker);
    // A thread that dies between two tasks must not take the process with it; the next task starts another.
    worker.on('error', ignore);
    worker.once('exit', () => {
      if (this.#started === started) this.#started = null;
    });
    started.catch(ignore);
    return started;
  }

  async #replace(worker: Worker): Promise<void> {
    send(worker, { kind: 'abort' });
    await pause(ABORT_GRACE_MILLISECONDS);
    await worker.terminate();
    this.#started = this.#start();
  }
}

function send(worker: Worker, message: ToThread): void {
  worker.postMessage(message);
}

async function answerOf(worker: Worker, settled: AbortSignal): Promise<AnalysisOutcome> {
  const message = await nextMessage(worker, settled);
  if (message.kind === 'ready') throw new Error('The thread said ready twice.');
  return message;
}

/** @throws what the thread died of, such as running out of memory */
async function nextMessage(worker: Worker, settled?: AbortSignal): Promise<FromThread> {
  const options = settled && { signal: settled };
  // `once` rejects when the thread emits an error.
  const message = once(worker, 'message', options) as Promise<[FromThread]>;
  const exit = once(worker, 'exit', options).then(([status]) => {
    throw new Error(`The thread ended with status ${String(status)} before it answered.`);
  });
  const [first] = await Promise.race([message, exit]);
  return first;
}

async function rejectionOf(signal: AbortSignal, settled: AbortSignal): Promise<never> {
  await once(signal, 'abort', { signal: settled });
  throw signal.reason;
}
