import type { Analysis } from '#lib/analysis/analyseRecording.ts';
import { ENGINE_VERSION } from '#lib/analysis/engineVersion.ts';
import type { Motion, NoRotationReason, ReadingWarning } from '#lib/analysis/reading.ts';
import type { AnalysedOutcome, UnreadableOutcome } from '#worker/threads/messages.ts';
import type { FileToAnalyse } from './analyseArguments.ts';

/** One line of `analyse --json`. Permanent: scripts and bench rigs read it; fields are added, never changed. */
export interface AnalysisLine {
  readonly file: string;
  readonly status: 'measured' | 'no-rotation' | 'failed';
  readonly motion: Motion | null;
  readonly rpm: number | null;
  readonly rpmLow: number | null;
  readonly rpmHigh: number | null;
  readonly confidence: number | null;
  readonly eventHz: number | null;
  readonly eventsPerTurn: number;
  readonly candidates: readonly { readonly rpm: number; readonly score: number; readonly reason: string }[];
  readonly trend: readonly { readonly t: number; readonly rpm: number | null }[];
  readonly durationSeconds: number | null;
  readonly sampleRate: number | null;
  readonly engine: string;
  readonly elapsedMs: number;
  readonly reason: NoRotationReason | null;
  readonly warnings: readonly ReadingWarning[];
  readonly error: { readonly code: string; readonly message: string } | null;
}

/** What became of one file, and how long it took. */
export type FileOutcome = AnalysedOutcome | (UnreadableOutcome & { readonly elapsedSeconds: number });

const CANDIDATE_MAXIMUM_COUNT = 8;
const TREND_POINTS_PER_SECOND = 10;
/** Far below what any sound can tell, so that no figure carries digits that mean nothing. */
const RPM_DECIMALS = 3;
const RATIO_DECIMALS = 4;
const SECONDS_DECIMALS = 4;
const MILLISECONDS_DECIMALS = 1;

const rounded = (value: number, decimals: number): number => Number(value.toFixed(decimals));
const roundedRpm = (value: number): number => rounded(value, RPM_DECIMALS);

const NOTHING_MEASURED = { rpm: null, rpmLow: null, rpmHigh: null, confidence: null, eventHz: null } as const;

/** The line that tells what became of one file. */
export function analysisLine({ file, settings }: FileToAnalyse, outcome: FileOutcome): AnalysisLine {
  const elapsedMs = rounded(outcome.elapsedSeconds * 1000, MILLISECONDS_DECIMALS);
  const { eventsPerTurn } = settings;
  if (outcome.kind === 'analysed') {
    return { file, ...readingFields(outcome.analysis), engine: ENGINE_VERSION, elapsedMs, error: null };
  }
  return {
    file,
    status: 'failed',
    motion: null,
    ...NOTHING_MEASURED,
    eventsPerTurn,
    candidates: [],
    trend: [],
    durationSeconds: null,
    sampleRate: null,
    engine: ENGINE_VERSION,
    elapsedMs,
    reason: null,
    warnings: [],
    error: { code: outcome.code, message: outcome.message },
  };
}

function readingFields({ reading, series }: Analysis) {
  const common = {
    status: reading.status,
    motion: reading.motion,
    eventsPerTurn: reading.eventsPerTurn,
    candidates: reading.candidates.slice(0, CANDIDATE_MAXIMUM_COUNT).map(({ shaftSpeedRpm, score, reason }) => ({
      rpm: roundedRpm(shaftSpeedRpm),
      score: rounded(score, RATIO_DECIMALS),
      reason,
    })),
    trend: trendPoints(series) ?? silentTrend(reading.durationSeconds),
    durationSeconds: rounded(reading.durationSeconds, SECONDS_DECIMALS),
    sampleRate: reading.sampleRateHz,
    warnings: reading.warnings,
  };
  if (reading.status === 'no-rotation') return { ...common, ...NOTHING_MEASURED, reason: reading.reason };
  return {
    ...common,
    rpm: roundedRpm(reading.speed.shaftSpeedRpm),
    rpmLow: roundedRpm(reading.speed.lowRpm),
    rpmHigh: roundedRpm(reading.speed.highRpm),
    confidence: rounded(reading.confidence, RATIO_DECIMALS),
    eventHz: rounded(reading.eventHz, RATIO_DECIMALS),
    reason: null,
  };
}

function trendPoints(series: Analysis['series']): AnalysisLine['trend'] | null {
  const columns = series.find(({ name }) => name === 'trend')?.columns;
  const times = columns?.find(({ name }) => name === 'timeSeconds')?.values;
  const speeds = columns?.find(({ name }) => name === 'shaftSpeedRpm')?.values;
  if (!times || !speeds) return null;
  return Array.from(times, (timeSeconds, point) => {
    const shaftSpeedRpm = speeds[point] ?? Number.NaN;
    const rpm = Number.isFinite(shaftSpeedRpm) ? roundedRpm(shaftSpeedRpm) : null;
    return { t: rounded(timeSeconds, SECONDS_DECIMALS), rpm };
  });
}

/** Nothing was heard to turn: the trend says so all along. */
function silentTrend(durationSeconds: number): AnalysisLine['trend'] {
  return Array.from({ length: Math.floor(durationSeconds * TREND_POINTS_PER_SECOND) }, (_, point) => ({
    t: rounded((point + 0.5) / TREND_POINTS_PER_SECOND, SECONDS_DECIMALS),
    rpm: null,
  }));
}
