/**
 * What an analysis is told beside the sound: the geometry of the motor as event orders and the
 * range of speeds that are possible.
 */
export interface AnalysisSettings {
  /** Sound events per shaft turn, dimensionless, (0, 1000]; a fraction such as 0.5 is one event every second turn. */
  readonly eventsPerTurn: number;
  /** Other strong sound orders to expect, each in (0, 1000]; the first, when there is one, equals `eventsPerTurn`. */
  readonly orders: readonly number[];
  /** Slowest shaft speed to consider, rpm, > 0. */
  readonly minimumRpm: number;
  /** Fastest shaft speed to consider, rpm, > `minimumRpm`. */
  readonly maximumRpm: number;
  /** `auto` takes the mean of the channels, or the louder one where they cancel; a number takes that channel, from 0. */
  readonly channel: 'auto' | number;
  /** Start of the stretch to analyse, seconds from the start of the recording. */
  readonly fromSeconds: number | null;
  /** End of the stretch to analyse, seconds from the start of the recording. */
  readonly toSeconds: number | null;
  /** Known error of the recording device's sample clock, parts per million; positive = clock runs fast. */
  readonly clockCorrectionPpm: number | null;
}

/** Shaft speed range considered when nobody says otherwise, rpm. */
export const DEFAULT_MINIMUM_RPM = 60;
export const DEFAULT_MAXIMUM_RPM = 60_000;

export const DEFAULT_ANALYSIS_SETTINGS: AnalysisSettings = {
  eventsPerTurn: 1,
  orders: [],
  minimumRpm: DEFAULT_MINIMUM_RPM,
  maximumRpm: DEFAULT_MAXIMUM_RPM,
  channel: 'auto',
  fromSeconds: null,
  toSeconds: null,
  clockCorrectionPpm: null,
};
