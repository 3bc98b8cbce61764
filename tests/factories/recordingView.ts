import type { ReadingView, ReviewView } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';

const uuid = (number: number) => `0198f6a0-0000-7000-8000-${String(number).padStart(12, '0')}`;

/** A measured reading of 2874 rpm as the API gives it. */
export function readingView(changes: Partial<ReadingView> = {}): ReadingView {
  return {
    id: uuid(1),
    status: 'measured',
    motion: 'steady',
    rpm: 2874,
    rpmLow: 2868.1,
    rpmHigh: 2880.3,
    confidence: 0.97,
    eventHz: 287.4,
    eventsPerTurn: 6,
    candidates: [
      { rpm: 2874, score: 0.91, reason: '' },
      { rpm: 1437, score: 0.4, reason: '' },
    ],
    durationSeconds: 12,
    sampleRate: 48_000,
    engine: '0.1.0',
    elapsedMs: 31.5,
    reason: null,
    warnings: [],
    error: null,
    settings: {
      eventsPerTurn: 6,
      orders: [6],
      rpmMin: 60,
      rpmMax: 60_000,
      channel: 'auto',
      fromSeconds: null,
      toSeconds: null,
    },
    seriesNames: [],
    createdAt: '2026-12-01T10:00:12.000Z',
    ...changes,
  };
}

export function reviewView(changes: Partial<ReviewView> = {}): ReviewView {
  return {
    id: uuid(2),
    readingId: uuid(1),
    decision: 'confirm',
    rpm: null,
    reason: '',
    reviewer: { id: uuid(3), name: 'Ines Falk' },
    createdAt: '2026-12-01T10:05:00.000Z',
    ...changes,
  };
}

/** A done recording of the build Heron at 6 V as the API gives it. */
export function recordingView(changes: Partial<RecordingView> = {}): RecordingView {
  return {
    id: uuid(4),
    benchId: uuid(5),
    sessionId: uuid(6),
    fileName: 'heron.m4a',
    byteCount: 120_000,
    sha256: '0'.repeat(64),
    status: 'done',
    error: null,
    duplicateOf: null,
    build: {
      id: uuid(7),
      name: 'Heron',
      revision: 2,
      geometry: { poles: 2, segments: 3, blades: null, teeth: null, magnets: null },
      eventsPerTurn: 6,
    },
    supplyVolts: 6,
    currentAmps: null,
    note: null,
    media: { container: 'mov', codec: 'aac', sampleRateHz: 48_000, channelCount: 1, durationSeconds: 12 },
    uploadedBy: { id: uuid(3), name: 'Ines Falk' },
    createdAt: '2026-12-01T10:00:00.000Z',
    reading: readingView(),
    review: null,
    needsPerson: false,
    abilities: { canReview: true, canEdit: true, canAnalyseAgain: true },
    ...changes,
  };
}
