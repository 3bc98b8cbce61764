import type { RecordingView } from '#lib/schemas/recording.ts';

/** The conditions of a recording that is already here. */
export type PastRecording = Pick<RecordingView, 'sessionId' | 'build' | 'supplyVolts'>;

export interface NextRecording extends PastRecording {
  readonly build: NonNullable<RecordingView['build']>;
}

/** Steps such as 4.5 + 1.5 must not show the rounding of binary fractions. */
const VOLT_DECIMALS = 3;

/**
 * The recording that most likely comes next: the same build again, a step further when its voltage has
 * just been stepped upwards.
 *
 * @param recordings newest first
 * @returns null when the newest recording has no build
 */
export function likelyNext(recordings: readonly PastRecording[]): NextRecording | null {
  const [newest, before] = recordings;
  if (!newest?.build) return null;
  const isSameSeries = before?.build?.id === newest.build.id && before.sessionId === newest.sessionId;
  return {
    sessionId: newest.sessionId,
    build: newest.build,
    supplyVolts: nextVolts(newest.supplyVolts, isSameSeries ? before.supplyVolts : null),
  };
}

function nextVolts(newestVolts: number | null, voltsBefore: number | null): number | null {
  if (newestVolts === null || voltsBefore === null) return newestVolts;
  const stepVolts = newestVolts - voltsBefore;
  return stepVolts > 0 ? Number((newestVolts + stepVolts).toFixed(VOLT_DECIMALS)) : newestVolts;
}
