import type { SpeedDot } from '#components/session/SpeedDots.tsx';
import type { RecordingView } from '#lib/schemas/recording.ts';
import type { SessionView } from '#lib/schemas/session.ts';

/** A session with the speeds of its recordings, oldest first. */
export interface SessionDots {
  readonly session: SessionView;
  readonly dots: readonly SpeedDot[];
}

/** What the home page of a bench shows. */
export interface Overview {
  readonly cameInCount: number;
  readonly needsPersonCount: number;
  /** At most five. */
  readonly needsPerson: readonly RecordingView[];
  readonly running: readonly RecordingView[];
  readonly sessions: readonly SessionDots[];
}
