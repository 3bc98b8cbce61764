import { afterEach, describe, expect, it } from 'vitest';
import { DEFAULT_ANALYSIS_SETTINGS } from '#lib/analysis/settings.ts';
import { AnalysisThread } from '#worker/threads/AnalysisThread.ts';
import type { AnalysisTask } from '#worker/threads/messages.ts';

const entry = (name: string): URL => new URL(`../../../fixtures/threads/${name}`, import.meta.url);
const task = (path: string): AnalysisTask => ({ path, settings: DEFAULT_ANALYSIS_SETTINGS, warnings: [] });
const answerTo = (path: string) => ({ kind: 'unreadable', code: 'truncated', message: path });

let thread: AnalysisThread;
const started = (name = 'answers.mjs'): AnalysisThread => {
  thread = new AnalysisThread(entry(name));
  return thread;
};
afterEach(() => thread.close());

describe('AnalysisThread', () => {
  it('answers one task after the other from the same warm thread', async () => {
    await started().ready();
    expect(await thread.run(task('a'))).toEqual(answerTo('a'));
    expect(await thread.run(task('b'))).toEqual(answerTo('b'));
  });

  it.each([
    ['an uncaught error', 'throw', /thrown in the thread/],
    ['an exit', 'exit', /status 3/],
    ['running out of memory', 'out-of-memory', /memory/],
  ])('reports %s as a crash and works on', async (_, path, cause) => {
    const outcome = await started().run(task(path));
    expect(outcome).toMatchObject({ kind: 'crashed', cause: expect.stringMatching(cause) as string });
    expect(await thread.run(task('next'))).toEqual(answerTo('next'));
  });

  it.each(['hang', 'spin'])('ends a task that would %s for ever when it is aborted, and works on', async (path) => {
    await started().ready();
    const controller = new AbortController();
    const running = thread.run(task(path), controller.signal);
    controller.abort(new Error('the claim was lost'));
    await expect(running).rejects.toThrow('the claim was lost');
    expect(await thread.run(task('next'))).toEqual(answerTo('next'));
  });

  it('does not begin a task that is aborted already', async () => {
    await expect(started().run(task('a'), AbortSignal.abort(new Error('too late')))).rejects.toThrow('too late');
  });

  it('blames no file when the thread cannot even load', async () => {
    await expect(started('neverLoads.mjs').ready()).rejects.toThrow('this thread cannot load');
    await expect(thread.run(task('a'))).rejects.toThrow('this thread cannot load');
  });
});
