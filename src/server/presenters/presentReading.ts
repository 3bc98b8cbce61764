import type { SeriesName } from '#lib/analysis/series.ts';
import type { ReadingView } from '#lib/schemas/reading.ts';
import type { Reading } from '../models/Reading.ts';

interface ReadingDetails {
  readonly reading: Reading;
  readonly seriesNames: readonly SeriesName[];
}

const MILLISECONDS_PER_SECOND = 1000;

export function presentReading({ reading, seriesNames }: ReadingDetails): ReadingView {
  const { settings } = reading;
  return {
    id: reading.id,
    status: reading.status,
    motion: reading.motion,
    rpm: reading.shaftSpeedRpm,
    rpmLow: reading.lowRpm,
    rpmHigh: reading.highRpm,
    confidence: reading.confidence,
    eventHz: reading.eventHz,
    eventsPerTurn: reading.eventsPerTurn,
    candidates: reading.candidates.map(({ shaftSpeedRpm, score, reason }) => ({ rpm: shaftSpeedRpm, score, reason })),
    durationSeconds: reading.durationSeconds,
    sampleRate: reading.sampleRateHz,
    engine: reading.engineVersion,
    elapsedMs: reading.elapsedSeconds * MILLISECONDS_PER_SECOND,
    reason: reading.noRotationReason,
    warnings: [...reading.warnings],
    error: null,
    settings: {
      eventsPerTurn: settings.eventsPerTurn,
      orders: [...settings.orders],
      rpmMin: settings.minimumRpm,
      rpmMax: settings.maximumRpm,
      channel: settings.channel,
      fromSeconds: settings.fromSeconds,
      toSeconds: settings.toSeconds,
    },
    seriesNames: [...seriesNames],
    createdAt: reading.createdAt.toISOString(),
  };
}
