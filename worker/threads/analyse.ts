/**
 * Entry of an analysis thread. It decodes and analyses, one file at a time, so that neither ever holds up the event
 * loop that renews the claim. It knows no database and no settings: `npm run analyse` uses it as well.
 */
import { parentPort } from 'node:worker_threads';
import { analyseRecording } from '#lib/analysis/analyseRecording.ts';
import { AnalysisRefused } from '#lib/analysis/analysisRefused.ts';
import { clock } from '#server/clock.ts';
import { decodeAudio } from '#server/media/decodeAudio.ts';
import { DecoderCrashed, MediaRefused, MediaUnreadable } from '#server/media/mediaErrors.ts';
import { probeMedia } from '#server/media/probeMedia.ts';
import type { AnalysedOutcome, AnalysisOutcome, AnalysisTask, FromThread, ToThread } from './messages.ts';

/** Nobody waits for this answer as an upload does, so a busy machine may take its time. */
const PROBE_WALL_SECONDS = 20;

let running: AbortController | null = null;

async function analyseFile({ path, settings, warnings }: AnalysisTask, signal: AbortSignal): Promise<AnalysedOutcome> {
  const startedSeconds = clock.monotonicSeconds();
  const probe = await probeMedia(path, { wallSeconds: PROBE_WALL_SECONDS, signal });
  const audio = await decodeAudio(path, probe, signal);
  const { channels, sampleRateHz } = audio;
  const allWarnings = [...new Set([...warnings, ...audio.warnings])];
  const analysis = analyseRecording({ channels, sampleRateHz, settings, warnings: allWarnings });
  return { kind: 'analysed', analysis, elapsedSeconds: clock.monotonicSeconds() - startedSeconds };
}

function failedOutcome(error: unknown): AnalysisOutcome {
  if (error instanceof MediaUnreadable || error instanceof MediaRefused || error instanceof AnalysisRefused) {
    return { kind: 'unreadable', code: error.code, message: error.message };
  }
  if (error instanceof DecoderCrashed) return { kind: 'crashed', cause: error.message };
  // A file that the engine stumbles over is as poisonous as one that kills the decoder.
  return { kind: 'crashed', cause: error instanceof Error ? (error.stack ?? error.message) : String(error) };
}

/** The arrays of a reading's series change hands without a copy. */
function transferables(outcome: AnalysisOutcome): ArrayBuffer[] {
  if (outcome.kind !== 'analysed') return [];
  const buffers = outcome.analysis.series.flatMap(({ columns }) => columns.map(({ values }) => values.buffer));
  return [...new Set(buffers)].filter((buffer) => buffer instanceof ArrayBuffer);
}

function send(message: FromThread, transferred: ArrayBuffer[] = []): void {
  parentPort?.postMessage(message, transferred);
}

async function run(task: AnalysisTask): Promise<void> {
  const controller = new AbortController();
  running = controller;
  const outcome = await analyseFile(task, controller.signal).catch(failedOutcome);
  running = null;
  // After an abort nobody waits for an answer any more.
  if (!controller.signal.aborted) send(outcome, transferables(outcome));
}

parentPort?.on('message', (message: ToThread) => {
  if (message.kind === 'abort') running?.abort();
  else void run(message.task);
});
send({ kind: 'ready' });
