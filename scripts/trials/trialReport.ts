import { ENGINE_VERSION } from '#lib/analysis/engineVersion.ts';
import type { TrialResult } from './runTrial.ts';
import {
  type MotorlessSummary,
  type MotorSummary,
  reliability,
  type ReliabilityBin,
  summariseMotorless,
  summariseMotors,
} from './trialSummary.ts';

/** Everything that a run of the trials found. */
export interface TrialReport {
  readonly engineVersion: string;
  readonly firstSeed: number;
  readonly seedCount: number;
  readonly motors: readonly MotorSummary[];
  readonly allMotors: MotorSummary;
  readonly steadyMotors: MotorSummary;
  readonly motorless: readonly MotorlessSummary[];
  readonly allMotorless: MotorlessSummary;
  readonly reliability: readonly ReliabilityBin[];
  readonly results: readonly TrialResult[];
}

/** Sums results up by class, in the order in which the classes first appear. */
export function trialReport(
  results: readonly TrialResult[],
  seeds: { readonly firstSeed: number; readonly seedCount: number },
): TrialReport {
  const withMotor = results.filter(({ hasMotor }) => hasMotor);
  const withoutMotor = results.filter(({ hasMotor }) => !hasMotor);
  return {
    engineVersion: ENGINE_VERSION,
    ...seeds,
    motors: byClass(withMotor).map(([name, own]) => summariseMotors(name, own)),
    allMotors: summariseMotors('all with a motor', withMotor),
    steadyMotors: summariseMotors(
      'all steady',
      withMotor.filter(({ isSteady }) => isSteady),
    ),
    motorless: byClass(withoutMotor).map(([name, own]) => summariseMotorless(name, own)),
    allMotorless: summariseMotorless('all without a motor', withoutMotor),
    reliability: reliability(results),
    results,
  };
}

function byClass(results: readonly TrialResult[]): [string, TrialResult[]][] {
  const classes = new Map<string, TrialResult[]>();
  for (const result of results) classes.set(result.className, [...(classes.get(result.className) ?? []), result]);
  return [...classes];
}
