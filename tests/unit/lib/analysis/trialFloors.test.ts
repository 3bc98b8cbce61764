/** A fixed part of `npm run trials`, so that no change makes the engine worse unnoticed. */
import { describe, expect, it } from 'vitest';
import { MOTOR_CLASSES } from '#scripts/trials/motorClasses.ts';
import { MOTORLESS_CLASSES } from '#scripts/trials/motorlessClasses.ts';
import { runTrial } from '#scripts/trials/runTrial.ts';
import type { TrialClass } from '#scripts/trials/trialRecording.ts';
import { summariseMotorless, summariseMotors } from '#scripts/trials/trialSummary.ts';

/** Outside the seeds of the default trials. */
const SEED = 2000;

const STEADY_CLASSES = [
  'two contacts',
  '3 segments',
  '5 segments',
  '7 segments',
  'fan',
  'gear',
  'brushless',
  'beside hum',
  'in wind',
  'clipped',
];
/** What the engine is known not to tell from a motor reliably; see the limits in the README. */
const HARD_ROOMS = ['a tone', 'a voice', 'babble', 'music'];

function resultsOf(classes: readonly TrialClass[]) {
  return classes.map((trialClass) => runTrial(trialClass, SEED));
}

describe('analyseRecording', () => {
  it('is within 0.5 % for nine of ten steady classes and never wrong with confidence 0.9', () => {
    const classes = MOTOR_CLASSES.filter(({ name }) => STEADY_CLASSES.includes(name));
    const summary = summariseMotors('steady', resultsOf(classes));
    expect(summary.count).toBe(STEADY_CLASSES.length);
    expect(summary.withinHalfPercentCount).toBeGreaterThanOrEqual(9);
    expect(summary.boldErrorCount).toBe(0);
    // Of ten intervals of 95 % two or more miss in one of twelve runs only; the floor allows for one.
    expect(summary.coveredCount).toBeGreaterThanOrEqual(summary.rightRatioCount - 1);
  });

  it('calls every room without a motor "no rotation" that holds neither voice, music nor a single tone', () => {
    const classes = MOTORLESS_CLASSES.filter(({ name }) => !HARD_ROOMS.includes(name));
    const summary = summariseMotorless('rooms', resultsOf(classes));
    expect(summary.count).toBe(10);
    expect(summary.noRotationCount).toBe(10);
  });

  it('is never sure of a speed in voices, music and tones', () => {
    const classes = MOTORLESS_CLASSES.filter(({ name }) => HARD_ROOMS.includes(name));
    const summary = summariseMotorless('hard rooms', resultsOf(classes));
    expect(summary.count).toBe(HARD_ROOMS.length);
    expect(summary.boldErrorCount).toBe(0);
  });
});
