import type { Analysis } from '#lib/analysis/analyseRecording.ts';
import type { ReadingWarning } from '#lib/analysis/reading.ts';
import type { AnalysisSettings } from '#lib/analysis/settings.ts';

/** What a thread is asked to do: one file from bytes to a reading. */
export interface AnalysisTask {
  /** Path of a file that nobody writes to. */
  readonly path: string;
  readonly settings: AnalysisSettings;
  /** What was found before, repeated in the reading. */
  readonly warnings: readonly ReadingWarning[];
}

export type ToThread = { readonly kind: 'task'; readonly task: AnalysisTask } | { readonly kind: 'abort' };

export interface AnalysedOutcome {
  readonly kind: 'analysed';
  readonly analysis: Analysis;
  /** Decoding and analysis together. */
  readonly elapsedSeconds: number;
}

/** The file gives no reading, now or later: an expected result. */
export interface UnreadableOutcome {
  readonly kind: 'unreadable';
  readonly code: string;
  /** For the person who made the recording. */
  readonly message: string;
}

/** The decoder or the analysis died; the file or the machine may be to blame. */
export interface CrashedOutcome {
  readonly kind: 'crashed';
  /** For the log only. */
  readonly cause: string;
}

export type AnalysisOutcome = AnalysedOutcome | UnreadableOutcome | CrashedOutcome;

/** `ready` once, when the thread has loaded its code; then one outcome a task. */
export type FromThread = { readonly kind: 'ready' } | AnalysisOutcome;
