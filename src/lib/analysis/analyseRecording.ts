import { rpmFromEventHertz } from '#lib/units/rotation.ts';
import { fractionFromPpm } from '#lib/units/ratios.ts';
import { candidateReason } from './candidateReason.ts';
import { checkAnalysisInput } from './checkAnalysisInput.ts';
import { chooseChannel } from './chooseChannel.ts';
import type { ChosenSignal } from './chooseChannel.ts';
import { confidenceOf } from './confidence.ts';
import { ENGINE_VERSION } from './engineVersion.ts';
import { rotationSeries, soundSeries } from './evidence/recordingSeries.ts';
import { waveformSeries } from './evidence/waveformSeries.ts';
import { findShaft } from './findShaft.ts';
import type { ShaftSearch } from './findShaft.ts';
import { SILENCE_RMS } from './inputChecks.ts';
import { motionOf } from './motion.ts';
import type { Candidate, MeasuredReading, NoRotationReason, Reading, ReadingWarning } from './reading.ts';
import { rotationVerdict } from './rotationVerdict.ts';
import type { Series } from './series.ts';
import type { AnalysisSettings } from './settings.ts';
import { speedFigure } from './speedFigure.ts';

/** A decoded recording and what is known about it. */
export interface AnalysisInput {
  /** One array per channel, all of shape [sampleCount], full scale ±1; not written. */
  readonly channels: readonly Float32Array[];
  /** [8000, 192000] */
  readonly sampleRateHz: number;
  readonly settings: AnalysisSettings;
  /** What was found while decoding; repeated in the reading. */
  readonly warnings?: readonly ReadingWarning[];
}

/** The reading of a recording and the series that show why. */
export interface Analysis {
  readonly reading: Reading;
  readonly series: readonly Series[];
}

/** Below this nothing can be said about a speed. */
const SHORTEST_SECONDS = 0.3;
/** Part of clipped samples above which clipping, not the lack of a motor, may be why nothing was found. */
const BADLY_CLIPPED_FRACTION = 0.2;
const MOST_CANDIDATES = 8;
/** What is less probable than this is no answer that anybody should weigh. */
const LEAST_CANDIDATE_SCORE = 0.001;

/**
 * Measures how fast a shaft turned in a recording.
 *
 * Either a speed is found (`measured`, with its interval and the confidence that it is the right one of the
 * candidates) or the reason why not (`no-rotation`). Times count from the start of the recording, also when only a
 * stretch of it is analysed.
 *
 * @param input see `AnalysisInput`; the channels must be equally long
 * @returns the reading and at most 8192 rows per series
 * @throws {AnalysisRefused} when samples are not finite or lie beyond ±8
 * @throws {RangeError} when there is no channel or a setting is out of its range
 */
export function analyseRecording(input: AnalysisInput): Analysis {
  checkAnalysisInput(input);
  const { settings, sampleRateHz } = input;
  const firstSample = Math.round((settings.fromSeconds ?? 0) * sampleRateHz);
  const endSample = settings.toSeconds === null ? undefined : Math.round(settings.toSeconds * sampleRateHz);
  const channels = input.channels.map((channel) => channel.subarray(firstSample, endSample));
  if ((channels[0]?.length ?? 0) < SHORTEST_SECONDS * sampleRateHz) return noRotation(input, 'too-short', [], []);
  const signal = chooseChannel(channels, settings.channel);
  const warnings = [...new Set([...(input.warnings ?? []), ...signal.warnings])];
  const startSeconds = firstSample / sampleRateHz;
  const waveform = waveformSeries(signal.samples, sampleRateHz, startSeconds);
  if (signal.rms < SILENCE_RMS) return noRotation(input, stillnessOf(signal), warnings, [waveform]);
  const search = findShaft({ samples: signal.samples, sampleRateHz }, settings);
  const series = [waveform, ...soundSeries(search, { samples: signal.samples, sampleRateHz }, startSeconds)];
  const seconds = signal.samples.length / sampleRateHz;
  const { reason } = rotationVerdict(search, seconds, signal.clippedFraction > BADLY_CLIPPED_FRACTION);
  if (reason !== null) {
    return noRotation(input, reason, warnings, series, candidatesOf(search, clockFactorOf(settings)));
  }
  return measured(input, search, warnings, series, startSeconds);
}

function measured(
  input: AnalysisInput,
  search: ShaftSearch,
  warnings: readonly ReadingWarning[],
  series: readonly Series[],
  startSeconds: number,
): Analysis {
  const { settings } = input;
  const [best] = search.ranked;
  if (!best) throw new Error('measured: needs at least one hypothesis');
  const figure = speedFigure(best.family.refined, settings.clockCorrectionPpm !== null);
  const clockFactor = clockFactorOf(settings);
  const eventHz = figure.eventHz * best.ratio * clockFactor;
  const shaftSpeedRpm = rpmFromEventHertz(eventHz, settings.eventsPerTurn);
  const reading: MeasuredReading = {
    ...baseOf(input, warnings),
    status: 'measured',
    motion: motionOf(best.family.refined.track),
    speed: {
      shaftSpeedRpm,
      lowRpm: shaftSpeedRpm * (1 - figure.relativeBelow),
      highRpm: shaftSpeedRpm * (1 + figure.relativeAbove),
    },
    confidence: confidenceOf(best, search.frontEnd),
    eventHz,
    candidates: candidatesOf(search, clockFactor).map((candidate, index) =>
      // The first candidate is the reading itself, to the last digit.
      index === 0 ? { ...candidate, shaftSpeedRpm } : candidate,
    ),
  };
  const uncertainty = Math.max(figure.relativeBelow, figure.relativeAbove);
  const evidence = rotationSeries(search.frontEnd, best, { settings, clockFactor, uncertainty, startSeconds });
  return { reading, series: [...series, ...evidence] };
}

function noRotation(
  input: AnalysisInput,
  reason: NoRotationReason,
  warnings: readonly ReadingWarning[],
  series: readonly Series[],
  candidates: readonly Candidate[] = [],
): Analysis {
  return {
    reading: { ...baseOf(input, warnings), status: 'no-rotation', motion: 'none', reason, candidates },
    series,
  };
}

function baseOf(input: AnalysisInput, warnings: readonly ReadingWarning[]) {
  return {
    engineVersion: ENGINE_VERSION,
    eventsPerTurn: input.settings.eventsPerTurn,
    durationSeconds: (input.channels[0]?.length ?? 0) / input.sampleRateHz,
    sampleRateHz: input.sampleRateHz,
    warnings,
  };
}

function candidatesOf({ ranked }: ShaftSearch, clockFactor: number): Candidate[] {
  const [best] = ranked;
  if (!best) return [];
  const listed = ranked.filter(({ probability }) => probability >= LEAST_CANDIDATE_SCORE);
  return listed.slice(0, MOST_CANDIDATES).map((hypothesis) => ({
    shaftSpeedRpm: hypothesis.shaftSpeedRpm * clockFactor,
    score: hypothesis.probability,
    reason: candidateReason(hypothesis, best),
  }));
}

/** A constant is no sound, but it is no silence either: something was connected. */
function stillnessOf(signal: ChosenSignal): NoRotationReason {
  return Math.abs(signal.offset) > SILENCE_RMS ? 'nothing-periodic' : 'silence';
}

/** A clock that runs fast takes more samples in a second than it says, so that every pitch seems low. */
function clockFactorOf({ clockCorrectionPpm }: AnalysisSettings): number {
  return 1 + fractionFromPpm(clockCorrectionPpm ?? 0);
}
