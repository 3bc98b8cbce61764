import { type AnalysisSettings, DEFAULT_ANALYSIS_SETTINGS } from '#lib/analysis/settings.ts';

/** What one source says about the motor in the sound; left out and null both mean that it says nothing. */
export interface SettingsSource {
  readonly eventsPerTurn?: number | null;
  readonly orders?: readonly number[] | null;
  readonly minimumRpm?: number | null;
  readonly maximumRpm?: number | null;
}

interface RecordedSettings extends SettingsSource {
  /** The analysis that a person asked for afterwards. */
  readonly wantedSettings?: Partial<AnalysisSettings> | null;
}

interface ResolveOptions {
  readonly recording: RecordedSettings;
  readonly build: SettingsSource | null;
  /** Known error of the recording device's clock, ppm; null when the device is not known. */
  readonly clockCorrectionPpm: number | null;
}

/** Fastest over slowest speed of the default range; a range of which one end is given spans as much. */
const SPEED_RANGE_RATIO = DEFAULT_ANALYSIS_SETTINGS.maximumRpm / DEFAULT_ANALYSIS_SETTINGS.minimumRpm;

/**
 * The settings of the next analysis of a recording: what was asked for it wins over what was given with the upload,
 * that over the build, and that over the defaults.
 */
export function resolveAnalysisSettings({ recording, build, clockCorrectionPpm }: ResolveOptions): AnalysisSettings {
  const wanted = recording.wantedSettings ?? {};
  const sources = [wanted, recording, build ?? {}, DEFAULT_ANALYSIS_SETTINGS];
  return {
    ...resolveOrders(sources),
    ...resolveSpeedRange(sources),
    channel: wanted.channel ?? DEFAULT_ANALYSIS_SETTINGS.channel,
    fromSeconds: wanted.fromSeconds ?? null,
    toSeconds: wanted.toSeconds ?? null,
    clockCorrectionPpm,
  };
}

/** Orders belong to the events per turn that they were named with: a source that gives another number drops them. */
function resolveOrders(sources: readonly SettingsSource[]): Pick<AnalysisSettings, 'eventsPerTurn' | 'orders'> {
  const eventsPerTurn = firstGiven(sources, ownEventsPerTurn) ?? DEFAULT_ANALYSIS_SETTINGS.eventsPerTurn;
  const orders = firstGiven(sources, (source) => {
    const isSameMotor = ownEventsPerTurn(source) === eventsPerTurn;
    return isSameMotor && hasOrders(source) ? source.orders : null;
  });
  if (orders === null) return { eventsPerTurn, orders: [] };
  return { eventsPerTurn, orders: [eventsPerTurn, ...orders.filter((order) => order !== eventsPerTurn)] };
}

/** The first of the orders is the events per turn, unless that is said as well. */
function ownEventsPerTurn(source: SettingsSource): number | null {
  return source.eventsPerTurn ?? source.orders?.[0] ?? null;
}

function hasOrders(source: SettingsSource): source is { readonly orders: readonly number[] } {
  return (source.orders?.length ?? 0) > 0;
}

/** The range stays a range: an end that contradicts what a stronger source said is passed over. */
function resolveSpeedRange(sources: readonly SettingsSource[]): Pick<AnalysisSettings, 'minimumRpm' | 'maximumRpm'> {
  let minimum: number | null = null;
  let maximum: number | null = null;
  for (const { minimumRpm, maximumRpm } of sources) {
    if (minimum === null && (minimumRpm ?? Number.POSITIVE_INFINITY) < (maximum ?? Number.POSITIVE_INFINITY)) {
      minimum = minimumRpm ?? null;
    }
    if (maximum === null && (maximumRpm ?? 0) > (minimum ?? 0)) maximum = maximumRpm ?? null;
  }
  const { minimumRpm, maximumRpm } = DEFAULT_ANALYSIS_SETTINGS;
  return {
    minimumRpm: minimum ?? (maximum ?? maximumRpm) / SPEED_RANGE_RATIO,
    maximumRpm: maximum ?? (minimum ?? minimumRpm) * SPEED_RANGE_RATIO,
  };
}

function firstGiven<Value>(
  sources: readonly SettingsSource[],
  read: (source: SettingsSource) => Value | null,
): Value | null {
  for (const source of sources) {
    const value = read(source);
    if (value !== null) return value;
  }
  return null;
}
