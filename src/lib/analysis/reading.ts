/** How the shaft moved while it was heard. */
export const MOTIONS = ['steady', 'varying', 'intermittent', 'none'] as const;
export type Motion = (typeof MOTIONS)[number];

/** Why nothing turning was heard. */
export const NO_ROTATION_REASONS = ['silence', 'hum', 'nothing-periodic', 'too-short', 'clipped', 'speech'] as const;
export type NoRotationReason = (typeof NO_ROTATION_REASONS)[number];

/** What the reader of a reading should know about the sound it came from. */
export const READING_WARNINGS = [
  'clipped',
  'low-level',
  'dead-channel',
  'opposite-channels',
  'header-mismatch',
  'partial',
] as const;
export type ReadingWarning = (typeof READING_WARNINGS)[number];

/** A shaft speed with its 95 % interval, all in rpm; `lowRpm` ≤ `shaftSpeedRpm` ≤ `highRpm`. */
export interface UncertainSpeed {
  readonly shaftSpeedRpm: number;
  readonly lowRpm: number;
  readonly highRpm: number;
}

/** One speed the sound could mean. */
export interface Candidate {
  readonly shaftSpeedRpm: number;
  /** Relative weight of this candidate among all, dimensionless, [0, 1]. */
  readonly score: number;
  /** Why, as a sentence for people. */
  readonly reason: string;
}

interface ReadingBase {
  readonly engineVersion: string;
  readonly eventsPerTurn: number;
  readonly durationSeconds: number;
  readonly sampleRateHz: number;
  /** Best first, at most eight; may be present without rotation, as what it would be if something did turn. */
  readonly candidates: readonly Candidate[];
  readonly warnings: readonly ReadingWarning[];
}

/** A speed was found. */
export interface MeasuredReading extends ReadingBase {
  readonly status: 'measured';
  readonly motion: Exclude<Motion, 'none'>;
  /** Median speed while turning. */
  readonly speed: UncertainSpeed;
  /** Calibrated probability that the speed is right within 1 %, [0, 1]; below 0.5 the reading is unsure. */
  readonly confidence: number;
  /** Event (commutation) rate at the median speed, Hz. */
  readonly eventHz: number;
}

/** Nothing turning was heard: a result, not a failure. */
export interface NoRotationReading extends ReadingBase {
  readonly status: 'no-rotation';
  readonly motion: 'none';
  readonly reason: NoRotationReason;
}

export type Reading = MeasuredReading | NoRotationReading;

/** Below this confidence a measured reading is called unsure and waits for a person. */
export const UNSURE_BELOW_CONFIDENCE = 0.5;
