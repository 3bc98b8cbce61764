import {
  isUnsure,
  speedOf,
  standingOf,
  type MeasuredSpeed,
  type Standing,
} from '#components/recording/recordingStanding.ts';
import { confidenceWords } from '#components/recording/readingWords.ts';
import { plainNumberText } from '#lib/format/numberText.ts';
import { uncertainText } from '#lib/format/uncertainText.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';

/** One recording as one row of its session's table. */
export interface SessionRow {
  readonly recordingId: string;
  /** Place in the order of recording, from 1. */
  readonly order: number;
  readonly fileName: string;
  readonly recordedAt: string;
  readonly supplyVolts: number | null;
  /** Build and conditions in a few words. */
  readonly circumstances: string;
  readonly speed: MeasuredSpeed | null;
  readonly isUnsure: boolean;
  readonly standing: Standing;
  readonly needsPerson: boolean;
}

export const ROW_ORDERS = ['newest', 'supply', 'speed'] as const;
export type RowOrder = (typeof ROW_ORDERS)[number];

/** The rows of a session, newest first. @param recordings newest first, @param recordingCount of the whole session */
export function sessionRows(recordings: readonly RecordingView[], recordingCount: number): SessionRow[] {
  return recordings.map((recording, index) => ({
    recordingId: recording.id,
    order: Math.max(recordingCount, recordings.length) - index,
    fileName: recording.fileName,
    recordedAt: recording.createdAt,
    supplyVolts: recording.supplyVolts,
    circumstances: circumstancesOf(recording),
    speed: speedOf(recording),
    isUnsure: isUnsure(recording),
    standing: standingBesideSpeed(recording),
    needsPerson: recording.needsPerson,
  }));
}

/** Rows in the wanted order; those without the figure come last. */
export function orderedRows(rows: readonly SessionRow[], order: RowOrder): SessionRow[] {
  const keyOf = {
    newest: (row: SessionRow) => -row.order,
    supply: (row: SessionRow) => row.supplyVolts ?? Number.POSITIVE_INFINITY,
    speed: (row: SessionRow) => row.speed?.rpm ?? Number.POSITIVE_INFINITY,
  }[order];
  // Two endless keys differ by NaN, which counts as equal here.
  return rows.toSorted((a, b) => keyOf(a) - keyOf(b) || b.order - a.order);
}

/** The speed has a column of its own, so the standing says how far to trust it. */
function standingBesideSpeed(recording: RecordingView): Standing {
  const standing = standingOf(recording);
  const speed = speedOf(recording);
  if (standing.shape !== null || speed === null) return standing;
  const { low, high } = uncertainText({ value: speed.rpm, low: speed.rpmLow, high: speed.rpmHigh });
  const trust = recording.review
    ? `looked at by ${recording.review.reviewer.name}`
    : confidenceWords(recording.reading?.confidence ?? 0).toLowerCase();
  return { shape: null, sentence: `Between ${low} and ${high}; ${trust}` };
}

function circumstancesOf({ build, supplyVolts, currentAmps, note }: RecordingView): string {
  return [
    build?.name,
    supplyVolts === null ? null : `${plainNumberText(supplyVolts)} V`,
    currentAmps === null ? null : `${plainNumberText(currentAmps)} A`,
    note,
  ]
    .filter(Boolean)
    .join(' · ');
}
