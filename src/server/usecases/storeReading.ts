import { endianness } from 'node:os';
import type { Transaction } from 'sequelize';
import { v7 as uuidV7 } from 'uuid';
import type { Analysis } from '#lib/analysis/analyseRecording.ts';
import type { Series } from '#lib/analysis/series.ts';
import type { AnalysisSettings } from '#lib/analysis/settings.ts';
import { inTransaction } from '../database/inTransaction.ts';
import { Reading } from '../models/Reading.ts';
import { ReadingSeries } from '../models/ReadingSeries.ts';
import { finishClaim, type RecordingClaim } from '../models/recordingClaims.ts';
import { announceRecording } from './announceRecording.ts';
import { settingsHash } from './settingsHash.ts';

interface FinishedAnalysis {
  readonly claim: RecordingClaim;
  readonly analysis: Analysis;
  readonly settings: AnalysisSettings;
  /** Decoding and analysis together. */
  readonly elapsedSeconds: number;
}

/**
 * Stores the result of an analysis and makes it the current reading, all in one transaction. The same recording,
 * engine and settings give the same reading: one that exists already is taken, not doubled.
 *
 * @returns false when the claim was lost; nothing is stored then
 */
export function storeReading(finished: FinishedAnalysis): Promise<boolean> {
  const { claim, analysis, settings } = finished;
  const identity = {
    benchId: claim.benchId,
    recordingId: claim.recordingId,
    engineVersion: analysis.reading.engineVersion,
    settingsHash: settingsHash(settings),
  };
  return inTransaction(async (transaction) => {
    const equal = await Reading.findOne({
      where: identity,
      attributes: ['id'],
      transaction,
    });
    const readingId = equal?.id ?? uuidV7();
    // First, because it locks the row: from here on nobody else stores for this recording.
    if (!(await finishClaim(claim, readingId, transaction))) return false;
    if (equal === null) {
      await Reading.create({ id: readingId, ...identity, ...readingColumns(finished) }, { transaction });
      await storeSeries({ readingId, benchId: claim.benchId, series: analysis.series }, transaction);
    }
    await announceRecording(claim, 'done', transaction);
    return true;
  });
}

function readingColumns({ analysis: { reading }, settings, elapsedSeconds }: FinishedAnalysis) {
  const { status, motion, eventsPerTurn, durationSeconds, sampleRateHz } = reading;
  const common = {
    status,
    motion,
    eventsPerTurn,
    durationSeconds,
    sampleRateHz,
    settings,
    elapsedSeconds,
  };
  const lists = {
    candidates: [...reading.candidates],
    warnings: [...reading.warnings],
  };
  if (reading.status === 'no-rotation') return { ...common, ...lists, noRotationReason: reading.reason };
  const { speed, confidence, eventHz } = reading;
  return { ...common, ...lists, ...speed, confidence, eventHz };
}

async function storeSeries(
  { readingId, benchId, series }: { readingId: string; benchId: string; series: readonly Series[] },
  transaction: Transaction,
): Promise<void> {
  const rows = series.map(({ name, columns }) => ({
    readingId,
    benchId,
    name,
    columnsLayout: columns.map((column) => ({
      name: column.name,
      unit: column.unit,
      length: column.values.length,
    })),
    payload: Buffer.concat(columns.map(({ values }) => littleEndianBytes(values))),
  }));
  await ReadingSeries.bulkCreate(rows, { transaction });
}

function littleEndianBytes(values: Float32Array): Buffer {
  const bytes = Buffer.from(values.buffer, values.byteOffset, values.byteLength);
  return endianness() === 'LE' ? bytes : Buffer.from(bytes).swap32();
}
