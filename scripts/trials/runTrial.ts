import { analyseRecording } from '#lib/analysis/analyseRecording.ts';
import type { NoRotationReason } from '#lib/analysis/reading.ts';
import type { Series } from '#lib/analysis/series.ts';
import { DEFAULT_ANALYSIS_SETTINGS } from '#lib/analysis/settings.ts';
import { quantile } from '#lib/statistics/quantiles.ts';
import { clock } from '#server/clock.ts';
import { strongestPeakRpm } from './strongestPeak.ts';
import type { TrialClass, TrialTruth } from './trialRecording.ts';

/** The measured speed and how far it is from the truth. */
export interface TrialAnswer {
  readonly shaftSpeedRpm: number;
  readonly lowRpm: number;
  readonly highRpm: number;
  readonly confidence: number;
}

/** How well the trend follows the true speed. */
export interface TrendErrors {
  /** Middle and 95th percentile of the relative error over the points while turning; NaN when there are none. */
  readonly median: number;
  readonly high: number;
  /** Points at which the shaft stood, and how many of them the trend leaves empty. */
  readonly stoppedCount: number;
  readonly stoppedSeenCount: number;
}

/** What came of one recording. */
export interface TrialResult {
  readonly className: string;
  readonly seed: number;
  readonly hasMotor: boolean;
  readonly isSteady: boolean;
  /** Null where nothing turns. */
  readonly trueRpm: number | null;
  /** Null for "no rotation". */
  readonly answer: TrialAnswer | null;
  readonly reason: NoRotationReason | null;
  readonly trend: TrendErrors | null;
  /** What the strongest peak of the spectrum would have said. */
  readonly strongestPeakRpm: number;
  /** Length of the recording over the time that the analysis took. */
  readonly timesRealTime: number;
}

/** Below this part of its usual speed a shaft is starting or stopping, and relative errors say nothing. */
const TURNING_FRACTION = 0.1;

/** Makes one recording of a class and analyses it as the worker would. */
export function runTrial(trialClass: TrialClass, seed: number): TrialResult {
  const { samples, sampleRateHz, truth, settings: entered } = trialClass.make(seed);
  const settings = { ...DEFAULT_ANALYSIS_SETTINGS, ...entered };
  const startedSeconds = clock.monotonicSeconds();
  const { reading, series } = analyseRecording({ channels: [samples], sampleRateHz, settings });
  const elapsedSeconds = clock.monotonicSeconds() - startedSeconds;
  const isMeasured = reading.status === 'measured';
  return {
    className: trialClass.name,
    seed,
    hasMotor: trialClass.hasMotor,
    isSteady: truth?.isSteady ?? false,
    trueRpm: truth?.shaftSpeedRpm ?? null,
    answer: isMeasured ? { ...reading.speed, confidence: reading.confidence } : null,
    reason: isMeasured ? null : reading.reason,
    trend: isMeasured && truth ? trendErrors(series, truth) : null,
    strongestPeakRpm: strongestPeakRpm(samples, sampleRateHz, settings),
    timesRealTime: samples.length / sampleRateHz / elapsedSeconds,
  };
}

function trendErrors(series: readonly Series[], truth: TrialTruth): TrendErrors {
  const columns = series.find(({ name }) => name === 'trend')?.columns ?? [];
  const times = columns.find(({ name }) => name === 'timeSeconds')?.values ?? [];
  const speeds = columns.find(({ name }) => name === 'shaftSpeedRpm')?.values ?? [];
  const errors: number[] = [];
  let stoppedCount = 0;
  let stoppedSeenCount = 0;
  for (const [point, timeSeconds] of times.entries()) {
    const trueRpm = speedAt(truth, timeSeconds);
    const speedRpm = speeds[point] ?? Number.NaN;
    if (trueRpm > TURNING_FRACTION * truth.shaftSpeedRpm && !Number.isNaN(speedRpm))
      errors.push(Math.abs(speedRpm / trueRpm - 1));
    if (trueRpm === 0) {
      stoppedCount++;
      if (Number.isNaN(speedRpm)) stoppedSeenCount++;
    }
  }
  return { median: quantile(errors, 0.5), high: quantile(errors, 0.95), stoppedCount, stoppedSeenCount };
}

/** The truth has equal steps, so that its nearest point is found by division. */
function speedAt({ timesSeconds, speedsRpm }: TrialTruth, timeSeconds: number): number {
  const stepSeconds = (timesSeconds[1] ?? 1) - (timesSeconds[0] ?? 0);
  const point = Math.min(speedsRpm.length - 1, Math.max(0, Math.round(timeSeconds / stepSeconds)));
  return speedsRpm[point] ?? Number.NaN;
}
