import { UNSURE_BELOW_CONFIDENCE } from '#lib/analysis/reading.ts';
import { median } from '#lib/statistics/quantiles.ts';
import type { TrialResult } from './runTrial.ts';

/** Recordings of one class with a motor, counted. */
export interface MotorSummary {
  readonly className: string;
  readonly count: number;
  readonly withinFifthPercentCount: number;
  readonly withinHalfPercentCount: number;
  readonly withinOnePercentCount: number;
  /** Wrong by a simple ratio, by its name: how often. */
  readonly ratioErrors: Readonly<Record<string, number>>;
  readonly ratioErrorCount: number;
  readonly otherErrorCount: number;
  readonly refusedCount: number;
  /** Answers that a person would rely on, and the wrong ones among them. */
  readonly boldCount: number;
  readonly boldErrorCount: number;
  /** Answers with the right ratio, and those of them whose interval holds the truth. */
  readonly rightRatioCount: number;
  readonly coveredCount: number;
  /** Median over the recordings; NaN when none was measured. */
  readonly medianTrendError: number;
  readonly medianHighTrendError: number;
  readonly stoppedCount: number;
  readonly stoppedSeenCount: number;
  readonly strongestPeakWithinOnePercentCount: number;
  readonly medianTimesRealTime: number;
}

/** Recordings of one class without a motor, counted. */
export interface MotorlessSummary {
  readonly className: string;
  readonly count: number;
  readonly noRotationCount: number;
  /** A speed with the remark that it is unsure. */
  readonly unsureCount: number;
  /** A speed without that remark. */
  readonly wrongCount: number;
  readonly boldErrorCount: number;
  readonly medianTimesRealTime: number;
}

/** Answers whose confidence lies in one tenth. */
export interface ReliabilityBin {
  /** Lower end of the tenth. */
  readonly fromConfidence: number;
  readonly count: number;
  readonly meanConfidence: number;
  /** Part of them that is right within 1 %. */
  readonly rightShare: number;
}

export const BOLD_CONFIDENCE = 0.9;
/** Within this the ratio was right, and the interval is to be judged. */
const RIGHT_RATIO_ERROR = 0.03;
const RIGHT_ERROR = 0.01;
const RATIOS: Readonly<Record<string, number>> = {
  '×2': 2,
  '×½': 1 / 2,
  '×3': 3,
  '×⅓': 1 / 3,
  '×4': 4,
  '×¼': 1 / 4,
  '×5': 5,
  '×⅕': 1 / 5,
  '×6': 6,
  '×⅙': 1 / 6,
  '×3/2': 3 / 2,
  '×2/3': 2 / 3,
  '×4/3': 4 / 3,
  '×3/4': 3 / 4,
  '×5/2': 5 / 2,
  '×2/5': 2 / 5,
  '×5/3': 5 / 3,
  '×3/5': 3 / 5,
};
const BIN_COUNT = 10;

/** Relative error of the answer; Infinity without one or without a truth. */
export function errorOf({ answer, trueRpm }: TrialResult): number {
  return answer && trueRpm !== null ? Math.abs(answer.shaftSpeedRpm / trueRpm - 1) : Infinity;
}

export function isRight(result: TrialResult): boolean {
  return errorOf(result) <= RIGHT_ERROR;
}

function isBold({ answer }: TrialResult): boolean {
  return answer !== null && answer.confidence >= BOLD_CONFIDENCE;
}

function countOf(results: readonly TrialResult[], claim: (result: TrialResult) => boolean): number {
  return results.filter(claim).length;
}

export function summariseMotors(className: string, results: readonly TrialResult[]): MotorSummary {
  const answered = results.filter(({ answer }) => answer !== null);
  const wrong = answered.filter((result) => !isRight(result));
  const names = wrong.map(ratioName).filter((name) => name !== null);
  const rightRatio = answered.filter((result) => errorOf(result) < RIGHT_RATIO_ERROR);
  const trends = results.flatMap(({ trend }) => (trend ? [trend] : []));
  return {
    className,
    count: results.length,
    withinFifthPercentCount: countOf(results, (result) => errorOf(result) <= 0.002),
    withinHalfPercentCount: countOf(results, (result) => errorOf(result) <= 0.005),
    withinOnePercentCount: countOf(results, isRight),
    ratioErrors: Object.fromEntries(
      [...new Set(names)].map((name) => [name, names.filter((each) => each === name).length]),
    ),
    ratioErrorCount: names.length,
    otherErrorCount: wrong.length - names.length,
    refusedCount: results.length - answered.length,
    boldCount: countOf(results, isBold),
    boldErrorCount: countOf(wrong, isBold),
    rightRatioCount: rightRatio.length,
    coveredCount: countOf(rightRatio, isCovered),
    medianTrendError: median(trends.map((trend) => trend.median)),
    medianHighTrendError: median(trends.map((trend) => trend.high)),
    stoppedCount: trends.reduce((sum, trend) => sum + trend.stoppedCount, 0),
    stoppedSeenCount: trends.reduce((sum, trend) => sum + trend.stoppedSeenCount, 0),
    strongestPeakWithinOnePercentCount: countOf(results, isPeakRight),
    medianTimesRealTime: median(results.map(({ timesRealTime }) => timesRealTime)),
  };
}

function isCovered({ answer, trueRpm }: TrialResult): boolean {
  return answer !== null && trueRpm !== null && answer.lowRpm <= trueRpm && trueRpm <= answer.highRpm;
}

function isPeakRight({ strongestPeakRpm, trueRpm }: TrialResult): boolean {
  return trueRpm !== null && Math.abs(strongestPeakRpm / trueRpm - 1) <= RIGHT_ERROR;
}

function ratioName({ answer, trueRpm }: TrialResult): string | null {
  if (!answer || trueRpm === null) return null;
  const found = answer.shaftSpeedRpm / trueRpm;
  return Object.keys(RATIOS).find((name) => Math.abs(found / (RATIOS[name] ?? 1) - 1) <= RIGHT_ERROR) ?? null;
}

export function summariseMotorless(className: string, results: readonly TrialResult[]): MotorlessSummary {
  const answered = results.filter(({ answer }) => answer !== null);
  const unsureCount = countOf(answered, ({ answer }) => (answer?.confidence ?? 1) < UNSURE_BELOW_CONFIDENCE);
  return {
    className,
    count: results.length,
    noRotationCount: results.length - answered.length,
    unsureCount,
    wrongCount: answered.length - unsureCount,
    boldErrorCount: countOf(answered, isBold),
    medianTimesRealTime: median(results.map(({ timesRealTime }) => timesRealTime)),
  };
}

/** What confidence was worth: all answers by tenths, those without a motor counting as wrong. */
export function reliability(results: readonly TrialResult[]): ReliabilityBin[] {
  const answered = results.filter(({ answer }) => answer !== null);
  return Array.from({ length: BIN_COUNT }, (_, bin) => {
    const inside = answered.filter(
      ({ answer }) => Math.min(BIN_COUNT - 1, Math.floor(BIN_COUNT * (answer?.confidence ?? 0))) === bin,
    );
    return {
      fromConfidence: bin / BIN_COUNT,
      count: inside.length,
      meanConfidence: inside.reduce((sum, { answer }) => sum + (answer?.confidence ?? 0), 0) / inside.length,
      rightShare: countOf(inside, isRight) / inside.length,
    };
  });
}
