import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { ApiError, unreachableError } from '#client/api/ApiError.ts';
import type { UploadedRecording, UploadOptions } from '#client/api/uploadRecording.ts';
import { refusalBeforeSending } from '#client/uploads/refusalBeforeSending.ts';
import { UploadQueue } from '#client/uploads/uploadQueue.ts';

interface Attempt extends UploadOptions {
  readonly succeed: () => Promise<void>;
  readonly fail: (error: unknown) => Promise<void>;
}

/** A network under the test's control: every attempt waits until the test ends it. */
function queueOnHeldNetwork() {
  const attempts: Attempt[] = [];
  let keyCount = 0;
  const send = (options: UploadOptions) =>
    new Promise<UploadedRecording>((resolve, reject) => {
      options.signal.addEventListener('abort', () => {
        reject(new DOMException('cancelled', 'AbortError'));
      });
      attempts.push({
        ...options,
        succeed: () => {
          resolve({
            id: `recording of ${options.file.name}`,
            fileName: options.file.name,
            sha256: '',
            status: 'queued',
            duplicateOf: null,
          });
          return settled();
        },
        fail: (error) => {
          reject(error instanceof Error ? error : new Error(String(error)));
          return settled();
        },
      });
    });
  const createKey = () => `key-${String((keyCount += 1))}`;
  const queue = new UploadQueue({ send, createKey, refusalBeforeSending });
  return { queue, attempts };
}

async function settled() {
  await vi.advanceTimersByTimeAsync(0);
}
const file = (name: string, byteCount = 4) => new File([new Uint8Array(byteCount)], name);
const phases = (queue: UploadQueue) => queue.snapshot().map(({ state }) => state.phase);
const refusal = new ApiError({ code: 'no-audio', status: 422, detail: 'The file has no sound track.' });

function attemptOf(attempts: readonly Attempt[], index: number): Attempt {
  const attempt = attempts[index];
  if (!attempt) throw new Error(`no attempt ${String(index)} yet`);
  return attempt;
}

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  vi.useRealTimers();
});

describe('UploadQueue', () => {
  it('sends 2 of 3 files at once and the third when one is received', async () => {
    const { queue, attempts } = queueOnHeldNetwork();
    queue.add([file('a.wav'), file('b.wav'), file('c.wav')], {});
    expect(phases(queue)).toEqual(['sending', 'sending', 'waiting']);
    await attemptOf(attempts, 0).succeed();
    expect(phases(queue)).toEqual(['received', 'sending', 'sending']);
    expect(attempts.map((attempt) => attempt.file.name)).toEqual(['a.wav', 'b.wav', 'c.wav']);
  });

  it('tells the bytes of the file, never more than it has', () => {
    const { queue, attempts } = queueOnHeldNetwork();
    queue.add([file('a.wav', 1000)], {});
    attemptOf(attempts, 0).onProgress({ sentBytes: 400, totalBytes: 1300 });
    expect(queue.snapshot()[0]?.state).toEqual({ phase: 'sending', sentBytes: 400 });
    attemptOf(attempts, 0).onProgress({ sentBytes: 1300, totalBytes: 1300 });
    expect(queue.snapshot()[0]?.state).toEqual({ phase: 'sending', sentBytes: 1000 });
  });

  it('sends a broken-off file again with the same key after 1, 2, 4 … at most 30 s', async () => {
    const { queue, attempts } = queueOnHeldNetwork();
    queue.add([file('a.wav')], {});
    const pausesSeconds: number[] = [];
    for (let index = 0; index < 7; index += 1) {
      await attemptOf(attempts, index).fail(unreachableError());
      const state = queue.snapshot()[0]?.state;
      if (state?.phase !== 'paused') throw new Error('expected a pause');
      pausesSeconds.push(state.pauseSeconds);
      await vi.advanceTimersByTimeAsync(state.pauseSeconds * 1000);
    }
    expect(pausesSeconds).toEqual([1, 2, 4, 8, 16, 30, 30]);
    expect(new Set(attempts.map((attempt) => attempt.idempotencyKey))).toEqual(new Set(['key-1']));
  });

  it('goes on at once when the network is back, and only once', async () => {
    const { queue, attempts } = queueOnHeldNetwork();
    queue.add([file('a.wav')], {});
    await attemptOf(attempts, 0).fail(unreachableError());
    queue.resume();
    expect(phases(queue)).toEqual(['sending']);
    await vi.advanceTimersByTimeAsync(60_000);
    expect(attempts).toHaveLength(2);
  });

  it('keeps a refused file with the refusal and does not send it again by itself', async () => {
    const { queue, attempts } = queueOnHeldNetwork();
    queue.add([file('a.mp4')], {});
    await attemptOf(attempts, 0).fail(refusal);
    await vi.advanceTimersByTimeAsync(120_000);
    expect(queue.snapshot()[0]?.state).toEqual({ phase: 'refused', error: refusal });
    expect(attempts).toHaveLength(1);
  });

  it('retries a refused file by hand with the same key', async () => {
    const { queue, attempts } = queueOnHeldNetwork();
    queue.add([file('a.mp4')], {});
    await attemptOf(attempts, 0).fail(refusal);
    queue.retry('key-1');
    await attemptOf(attempts, 1).succeed();
    expect(attemptOf(attempts, 1).idempotencyKey).toBe('key-1');
    expect(phases(queue)).toEqual(['received']);
  });

  it('ends the request of a cancelled file and starts the next', async () => {
    const { queue, attempts } = queueOnHeldNetwork();
    queue.add([file('a.wav'), file('b.wav'), file('c.wav')], {});
    queue.cancel('key-1');
    await settled();
    expect(attemptOf(attempts, 0).signal.aborted).toBe(true);
    expect(phases(queue)).toEqual(['cancelled', 'sending', 'sending']);
  });

  it('does not wake a file that was cancelled during its pause', async () => {
    const { queue, attempts } = queueOnHeldNetwork();
    queue.add([file('a.wav')], {});
    await attemptOf(attempts, 0).fail(unreachableError());
    queue.cancel('key-1');
    await vi.advanceTimersByTimeAsync(60_000);
    expect(phases(queue)).toEqual(['cancelled']);
    expect(attempts).toHaveLength(1);
  });

  it('does not send an empty file and lets the next one go', () => {
    const { queue, attempts } = queueOnHeldNetwork();
    queue.add([file('a.wav', 0), file('b.wav')], {});
    expect(phases(queue)).toEqual(['refused', 'sending']);
    expect(attempts.map((attempt) => attempt.file.name)).toEqual(['b.wav']);
  });

  it('dismisses finished lines only', async () => {
    const { queue, attempts } = queueOnHeldNetwork();
    queue.add([file('a.wav'), file('b.wav')], {});
    await attemptOf(attempts, 0).succeed();
    queue.dismiss('key-1');
    queue.dismiss('key-2');
    expect(queue.snapshot().map((upload) => upload.key)).toEqual(['key-2']);
  });
});
