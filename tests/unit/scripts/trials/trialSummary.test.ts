import { describe, expect, it } from 'vitest';
import type { TrialAnswer, TrialResult } from '#scripts/trials/runTrial.ts';
import { reliability, summariseMotorless, summariseMotors } from '#scripts/trials/trialSummary.ts';

function result(answer: TrialAnswer | null, trueRpm: number | null = 1000): TrialResult {
  return {
    className: 'fan',
    seed: 1,
    hasMotor: trueRpm !== null,
    isSteady: true,
    trueRpm,
    answer,
    reason: answer ? null : 'nothing-periodic',
    trend: null,
    strongestPeakRpm: 2000,
    timesRealTime: 100,
  };
}

const answer = (shaftSpeedRpm: number, confidence: number) => ({
  shaftSpeedRpm,
  lowRpm: shaftSpeedRpm - 2,
  highRpm: shaftSpeedRpm + 2,
  confidence,
});

describe('summariseMotors', () => {
  const summary = summariseMotors('fan', [
    result(answer(1001, 0.95)),
    result(answer(1004, 0.9)),
    result(answer(1009, 0.5)),
    result(answer(500, 0.92)),
    result(answer(1234, 0.3)),
    result(null),
  ]);

  it('counts 1001, 1004 and 1009 of 1000 rpm within 0.2, 0.5 and 1 %', () => {
    expect(summary).toMatchObject({
      count: 6,
      withinFifthPercentCount: 1,
      withinHalfPercentCount: 2,
      withinOnePercentCount: 3,
    });
  });

  it('tells a half from any other error and from a refusal', () => {
    expect(summary).toMatchObject({
      ratioErrors: { '×½': 1 },
      ratioErrorCount: 1,
      otherErrorCount: 1,
      refusedCount: 1,
    });
  });

  it('counts three bold answers, one of them wrong, and one interval of three that holds the truth', () => {
    expect(summary).toMatchObject({ boldCount: 3, boldErrorCount: 1, rightRatioCount: 3, coveredCount: 1 });
  });
});

describe('summariseMotorless', () => {
  it('tells no rotation from an unsure speed, a speed and a bold one', () => {
    const results = [null, answer(300, 0.2), answer(300, 0.6), answer(300, 0.97)].map((each) => result(each, null));
    expect(summariseMotorless('hum', results)).toMatchObject({
      noRotationCount: 1,
      unsureCount: 1,
      wrongCount: 2,
      boldErrorCount: 1,
    });
  });
});

describe('reliability', () => {
  it('puts 0.95 and 1 into the last tenth, of which one of two is right', () => {
    const bins = reliability([result(answer(1000, 0.95)), result(answer(2000, 1)), result(null)]);
    expect(bins).toHaveLength(10);
    expect(bins[9]).toMatchObject({ fromConfidence: 0.9, count: 2, rightShare: 0.5 });
    expect(bins[9]?.meanConfidence).toBeCloseTo(0.975, 12);
    expect(bins[0]?.count).toBe(0);
  });
});
