import { describe, expect, it } from 'vitest';
import { DEFAULT_ANALYSIS_SETTINGS } from '#lib/analysis/settings.ts';
import { resolveAnalysisSettings, type SettingsSource } from '#server/usecases/resolveAnalysisSettings.ts';

interface Sources {
  readonly wanted?: Parameters<typeof resolveAnalysisSettings>[0]['recording']['wantedSettings'];
  readonly recording?: SettingsSource;
  readonly build?: SettingsSource;
}

const resolve = ({ wanted = null, recording = {}, build }: Sources) =>
  resolveAnalysisSettings({
    recording: { ...recording, wantedSettings: wanted },
    build: build ?? null,
    clockCorrectionPpm: null,
  });

describe('resolveAnalysisSettings', () => {
  it('gives the defaults when nobody said anything', () => {
    expect(resolve({})).toEqual(DEFAULT_ANALYSIS_SETTINGS);
  });

  it('takes what is wanted before the upload, the upload before the build', () => {
    const build = { eventsPerTurn: 6, minimumRpm: 500, maximumRpm: 9000 };
    expect(resolve({ build })).toMatchObject({ eventsPerTurn: 6, minimumRpm: 500, maximumRpm: 9000 });
    const recording = { eventsPerTurn: 3, minimumRpm: 600 };
    expect(resolve({ recording, build })).toMatchObject({ eventsPerTurn: 3, minimumRpm: 600, maximumRpm: 9000 });
    const wanted = { eventsPerTurn: 2, channel: 1, fromSeconds: 0.5, toSeconds: 4 };
    expect(resolve({ wanted, recording, build })).toMatchObject({ ...wanted, minimumRpm: 600, maximumRpm: 9000 });
  });

  it('takes the first order as the events per turn and puts it first otherwise', () => {
    expect(resolve({ recording: { orders: [5, 10] } })).toMatchObject({ eventsPerTurn: 5, orders: [5, 10] });
    expect(resolve({ recording: { eventsPerTurn: 10, orders: [5, 10] } })).toMatchObject({
      eventsPerTurn: 10,
      orders: [10, 5],
    });
  });

  it('keeps the orders of the build only while its events per turn hold', () => {
    const build = { eventsPerTurn: 6, orders: [6, 3] };
    expect(resolve({ build }).orders).toEqual([6, 3]);
    expect(resolve({ build, recording: { eventsPerTurn: 6 } }).orders).toEqual([6, 3]);
    expect(resolve({ build, recording: { eventsPerTurn: 4 } }).orders).toEqual([]);
  });

  it('passes over an end of the range that contradicts a stronger source', () => {
    expect(resolve({ recording: { minimumRpm: 5000 }, build: { maximumRpm: 4000 } })).toMatchObject({
      minimumRpm: 5000,
      maximumRpm: 60_000,
    });
    expect(resolve({ recording: { maximumRpm: 400 }, build: { minimumRpm: 500 } })).toMatchObject({
      minimumRpm: 60,
      maximumRpm: 400,
    });
  });

  it('spans a factor of 1000 when even the default end contradicts', () => {
    expect(resolve({ recording: { maximumRpm: 30 } })).toMatchObject({ minimumRpm: 0.03, maximumRpm: 30 });
    expect(resolve({ recording: { minimumRpm: 70_000 } })).toMatchObject({ minimumRpm: 70_000, maximumRpm: 7e7 });
  });

  it('hands on the clock correction of the device', () => {
    const settings = resolveAnalysisSettings({ recording: {}, build: null, clockCorrectionPpm: -12.5 });
    expect(settings.clockCorrectionPpm).toBe(-12.5);
  });
});
