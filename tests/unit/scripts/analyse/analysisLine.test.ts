import { describe, expect, it } from 'vitest';
import type { MeasuredReading } from '#lib/analysis/reading.ts';
import { DEFAULT_ANALYSIS_SETTINGS } from '#lib/analysis/settings.ts';
import { analysisLine } from '#scripts/analyse/analysisLine.ts';
import { analysisTable } from '#scripts/analyse/analysisTable.ts';

const file = { file: 'a.wav', path: '/a.wav', settings: { ...DEFAULT_ANALYSIS_SETTINGS, eventsPerTurn: 6 } };
const measured: MeasuredReading = {
  engineVersion: '9.9.9',
  status: 'measured',
  motion: 'steady',
  speed: { shaftSpeedRpm: 2874.00049, lowRpm: 2868.1, highRpm: 2880.3 },
  confidence: 0.97,
  eventHz: 287.4,
  eventsPerTurn: 6,
  durationSeconds: 12,
  sampleRateHz: 48_000,
  candidates: Array.from({ length: 9 }, (_, rank) => ({ shaftSpeedRpm: 2874 / (rank + 1), score: 0.9, reason: 'why' })),
  warnings: ['clipped'],
};
const trend = {
  name: 'trend' as const,
  columns: [
    { name: 'timeSeconds', unit: 's', values: Float32Array.of(0.05, 0.15) },
    { name: 'shaftSpeedRpm', unit: 'rpm', values: Float32Array.of(2873.5, Number.NaN) },
  ],
};
const analysed = (reading: MeasuredReading) =>
  ({ kind: 'analysed', analysis: { reading, series: [trend] }, elapsedSeconds: 0.0315 }) as const;

describe('analysisLine', () => {
  it('gives exactly the fields of the contract for a measured file', () => {
    const line = analysisLine(file, analysed(measured));
    expect(line).toMatchObject({
      file: 'a.wav',
      status: 'measured',
      motion: 'steady',
      rpm: 2874,
      rpmLow: 2868.1,
      rpmHigh: 2880.3,
      confidence: 0.97,
      eventHz: 287.4,
      eventsPerTurn: 6,
      durationSeconds: 12,
      sampleRate: 48_000,
      elapsedMs: 31.5,
      reason: null,
      warnings: ['clipped'],
      error: null,
    });
    expect(line.candidates).toHaveLength(8);
    expect(line.candidates[1]).toEqual({ rpm: 1437, score: 0.9, reason: 'why' });
  });

  it('gives null in the trend where nothing turns', () => {
    expect(analysisLine(file, analysed(measured)).trend).toEqual([
      { t: 0.05, rpm: 2873.5 },
      { t: 0.15, rpm: null },
    ]);
  });

  it('gives a trend of nulls, ten a second, when nothing turned', () => {
    const { engineVersion, eventsPerTurn, sampleRateHz } = measured;
    const silent = { engineVersion, eventsPerTurn, sampleRateHz, durationSeconds: 2, candidates: [], warnings: [] };
    const reading = { ...silent, status: 'no-rotation', motion: 'none', reason: 'silence' } as const;
    const line = analysisLine(file, { kind: 'analysed', analysis: { reading, series: [] }, elapsedSeconds: 0.01 });
    expect(line).toMatchObject({ rpm: null, rpmLow: null, rpmHigh: null, confidence: null, eventHz: null });
    expect(line).toMatchObject({ status: 'no-rotation', reason: 'silence' });
    expect(line.trend).toHaveLength(20);
    expect(line.trend[19]).toEqual({ t: 1.95, rpm: null });
  });

  it('gives code and message of a failed file and null for what is not known', () => {
    const failure = { kind: 'unreadable', code: 'not-audio', message: 'No.', elapsedSeconds: 0.002 } as const;
    expect(analysisLine(file, failure)).toMatchObject({
      status: 'failed',
      motion: null,
      rpm: null,
      confidence: null,
      durationSeconds: null,
      trend: [],
      elapsedMs: 2,
      error: { code: 'not-audio', message: 'No.' },
    });
  });
});

describe('analysisTable', () => {
  it('says unsure below a confidence of 0.5', () => {
    const unsure = analysisLine(file, analysed({ ...measured, confidence: 0.49, warnings: [] }));
    expect(analysisTable([unsure]).split('\n')[1]).toBe('a.wav  2874  2868 … 2880    49 %  steady  unsure');
  });
});
