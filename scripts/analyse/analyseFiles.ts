import { access, constants, stat } from 'node:fs/promises';
import { clock } from '#server/clock.ts';
import { CANNOT_DECODE_MESSAGE } from '#server/media/mediaErrors.ts';
import { AnalysisThread } from '#worker/threads/AnalysisThread.ts';
import type { UnreadableOutcome } from '#worker/threads/messages.ts';
import type { FileToAnalyse } from './analyseArguments.ts';
import { type AnalysisLine, analysisLine, type FileOutcome } from './analysisLine.ts';

interface AnalyseFilesOptions {
  readonly files: readonly FileToAnalyse[];
  /** Files analysed at the same time. */
  readonly jobCount: number;
  /** The bundled worker/threads/analyse.ts. */
  readonly threadEntry: URL;
}

/** Analyses files in threads and yields their lines in the order of the files, each as soon as all before it are done. */
export async function* analyseFiles({
  files,
  jobCount,
  threadEntry,
}: AnalyseFilesOptions): AsyncGenerator<AnalysisLine> {
  const threads = Array.from({ length: Math.min(jobCount, files.length) }, () => new AnalysisThread(threadEntry));
  const free = [...threads];
  const waiting: ((thread: AnalysisThread) => void)[] = [];
  const takeThread = (): Promise<AnalysisThread> => {
    const thread = free.pop();
    return thread ? Promise.resolve(thread) : new Promise((resolve) => waiting.push(resolve));
  };
  const giveBack = (thread: AnalysisThread): void => {
    const next = waiting.shift();
    if (next) next(thread);
    else free.push(thread);
  };
  const analyseOne = async (file: FileToAnalyse): Promise<AnalysisLine> => {
    const thread = await takeThread();
    try {
      return analysisLine(file, await outcomeOf(file, thread));
    } finally {
      giveBack(thread);
    }
  };
  try {
    const lines = files.map(analyseOne);
    for (const line of lines) yield await line;
  } finally {
    await Promise.all(threads.map((thread) => thread.close()));
  }
}

async function outcomeOf({ path, settings }: FileToAnalyse, thread: AnalysisThread): Promise<FileOutcome> {
  const startedSeconds = clock.monotonicSeconds();
  const failure = await reasonNotToRead(path);
  const outcome = failure ?? (await thread.run({ path, settings, warnings: [] }));
  switch (outcome.kind) {
    case 'analysed':
      return outcome;
    case 'unreadable':
      return { ...outcome, elapsedSeconds: clock.monotonicSeconds() - startedSeconds };
    case 'crashed':
      return {
        kind: 'unreadable',
        code: 'cannot-decode',
        message: CANNOT_DECODE_MESSAGE,
        elapsedSeconds: clock.monotonicSeconds() - startedSeconds,
      };
  }
}

async function reasonNotToRead(path: string): Promise<UnreadableOutcome | null> {
  try {
    if ((await stat(path)).isFile()) {
      await access(path, constants.R_OK);
      return null;
    }
    return { kind: 'unreadable', code: 'not-audio', message: 'This is not a file. Name the recordings in it.' };
  } catch {
    return { kind: 'unreadable', code: 'file-missing', message: 'There is no such file, or it may not be read.' };
  }
}
