import type { StateShape } from '#components/ui/StateMark.tsx';
import type { NoRotationReason } from '#lib/analysis/reading.ts';
import { UNSURE_BELOW_CONFIDENCE } from '#lib/analysis/reading.ts';
import { numberText, plainNumberText } from '#lib/format/numberText.ts';
import { uncertainSentence } from '#lib/format/uncertainText.ts';
import type { ReadingView } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';

/** Where a recording stands, as a shape and a few words for one row. */
export interface Standing {
  /** Null for a plain measured speed, which needs no mark. */
  readonly shape: StateShape | null;
  readonly sentence: string;
}

/** A measured speed with its interval, rpm. */
export interface MeasuredSpeed {
  readonly rpm: number;
  readonly rpmLow: number;
  readonly rpmHigh: number;
}

/** Whether a reading is unsure and nobody has looked at it; an unsure speed is drawn hollow. */
export function isUnsure({ reading, review }: Pick<RecordingView, 'reading' | 'review'>): boolean {
  return review === null && isUnsureConfidence(reading?.confidence ?? null);
}

export function isUnsureConfidence(confidence: number | null): boolean {
  return confidence !== null && confidence < UNSURE_BELOW_CONFIDENCE;
}

const NO_ROTATION_WORDS: Record<NoRotationReason, string> = {
  silence: 'silence',
  hum: 'only mains hum',
  'nothing-periodic': 'nothing periodic',
  'too-short': 'too short a stretch',
  clipped: 'too loud for the microphone',
  speech: 'only speech',
};

/** The speed of a recording that counts: what a person chose, else what was measured; null when there is none. */
export function speedOf({ reading, review }: Pick<RecordingView, 'reading' | 'review'>): MeasuredSpeed | null {
  if (review?.decision === 'nothing-turning' || review?.decision === 'record-again') return null;
  if (reading?.rpm == null || reading.rpmLow === null || reading.rpmHigh === null) return null;
  const factor = review?.decision === 'choose' && review.rpm !== null ? review.rpm / reading.rpm : 1;
  // A chosen multiple keeps the relative width: the line was measured as sharply, only its meaning changed.
  return { rpm: reading.rpm * factor, rpmLow: reading.rpmLow * factor, rpmHigh: reading.rpmHigh * factor };
}

/** What a row calls a recording: its build and voltage, or else its file. */
export function recordingName({ build, fileName, supplyVolts }: RecordingView): string {
  const name = build?.name ?? fileName;
  return supplyVolts === null ? name : `${name}, ${plainNumberText(supplyVolts)} V`;
}

/** Where a recording stands. */
export function standingOf(recording: RecordingView): Standing {
  if (recording.status === 'queued') return { shape: 'waiting', sentence: 'Waiting for its analysis' };
  if (recording.status === 'working') return { shape: 'working', sentence: 'Being analysed' };
  if (recording.status === 'failed') {
    return { shape: 'outside', sentence: recording.error?.message ?? 'The analysis failed.' };
  }
  const { reading, review } = recording;
  if (review?.decision === 'nothing-turning') return { shape: null, sentence: 'Nothing turning, a person says' };
  if (review?.decision === 'record-again') return { shape: 'flagged', sentence: 'To be recorded again' };
  const speed = speedOf(recording);
  if (speed === null || reading === null) return { shape: 'undecided', sentence: nothingTurningWords(reading) };
  const sentence = uncertainSentence({ value: speed.rpm, low: speed.rpmLow, high: speed.rpmHigh }, 'rpm');
  if (review !== null) return { shape: null, sentence: `${sentence}; confirmed by ${review.reviewer.name}` };
  return isUnsure(recording) ? { shape: 'undecided', sentence: unsureWords(reading) } : { shape: null, sentence };
}

function nothingTurningWords(reading: ReadingView | null): string {
  const reason = reading?.reason;
  return reason ? `Nothing turning heard: ${NO_ROTATION_WORDS[reason]}` : 'Nothing turning heard';
}

function unsureWords(reading: ReadingView): string {
  const [first, second] = reading.candidates.map(({ rpm }) => `${numberText(rpm, 0)} rpm`);
  if (first === undefined) return 'Unsure';
  return second === undefined ? `Unsure: perhaps ${first}` : `Unsure: ${first} or ${second}`;
}
