import { UNSURE_BELOW_CONFIDENCE } from '#lib/analysis/reading.ts';
import { numberText, plainNumberText } from '#lib/format/numberText.ts';
import { uncertainSentence } from '#lib/format/uncertainText.ts';
import type { SessionPurpose, SessionResultView } from '#lib/schemas/session.ts';
import type { Interval } from '#lib/statistics/interval.ts';
import { lineIntervals } from '#lib/statistics/lineIntervals.ts';
import { type LineMisfit, lineMisfit } from '#lib/statistics/lineMisfit.ts';
import { normalSample } from '#lib/statistics/normalSample.ts';

export interface SessionPoint {
  readonly recordingId: string;
  readonly recordedAt: string;
  readonly buildName: string | null;
  /** Build and revision; null when the recording names none. */
  readonly motor: string | null;
  readonly supplyVolts: number | null;
  readonly rpm: number;
  readonly rpmLow: number;
  readonly rpmHigh: number;
  readonly confidence: number;
  readonly reviewed: boolean;
}

export type Verdict = Pick<SessionResultView, 'sentence' | 'missing' | 'figures'>;

const SWEEP_VOLTAGE_MINIMUM_COUNT = 3;
/** A speed within this of the true one counts as right; what is so near its line is no misfit. */
const RIGHT_SPEED_RATIO = 0.01;
/**
 * Two results of one motor under the same conditions differ by more than this many standard deviations only once in
 * twenty: 1.96 √2. Reference: ISO 5725-6:1994, 4.1.4.
 */
const REPEATABILITY_FACTOR = 2.77;

/** What is computed for a purpose; the others have their points and the mean until their own method is made. */
const OWN_METHODS: Partial<Record<SessionPurpose, (points: readonly SessionPoint[]) => Verdict>> = {
  'voltage-sweep': sweepVerdict,
};

const NOT_YET_COMPUTED: Partial<Record<SessionPurpose, string>> = {
  'coast-down':
    'The friction of a coast-down is not computed yet; the speed over time of each recording shows the fall.',
  'run-time': 'The run time is not computed yet; the speed over time of each recording shows it.',
  load: 'The droop under load is not computed yet; the list shows the speed of each recording.',
  batch: 'Limits are not judged yet; the list shows the speed of each recording.',
  class: 'The ranking of builds is not computed yet; the list shows the speed of each recording.',
};

/** Figures, a sentence and what is still missing, from the recordings whose speed is sure or confirmed. */
export function sessionVerdict(purpose: SessionPurpose, points: readonly SessionPoint[]): Verdict {
  const sure = points.filter(({ reviewed, confidence }) => reviewed || confidence >= UNSURE_BELOW_CONFIDENCE);
  const verdict = (OWN_METHODS[purpose] ?? speedVerdict)(sure);
  const unsureCount = points.length - sure.length;
  const open = [unsureCount > 0 ? unsureWords(unsureCount) : null, NOT_YET_COMPUTED[purpose]];
  return { ...verdict, missing: [...verdict.missing, ...open.filter((words) => words != null)] };
}

function speedVerdict(points: readonly SessionPoint[]): Verdict {
  const [first, ...others] = points;
  if (first === undefined) {
    return { sentence: 'No speed is measured yet.', missing: ['A recording with a speed.'], figures: {} };
  }
  if (others.some(({ motor }) => motor !== first.motor)) {
    const sentence = `${recordings(points.length)} of several motors; a mean of them would be no motor’s speed.`;
    return { sentence, missing: [], figures: {} };
  }
  if (others.length === 0) return singleVerdict(first);
  const { mean, standardDeviation } = normalSample(points.map(({ rpm }) => rpm));
  const figures = { meanSpeed: inRpm(mean), speedSpread: inRpm(standardDeviation) };
  const sentence = `${recordings(points.length)} agree on ${uncertainSentence(mean, 'rpm')}.`;
  if (others.some(({ supplyVolts }) => supplyVolts !== first.supplyVolts)) {
    return { sentence, missing: ['One supply voltage for all, to tell the repeatability.'], figures };
  }
  return { sentence, missing: [], figures: { ...figures, repeatability: inRpm(repeatabilityOf(standardDeviation)) } };
}

/** One recording says nothing about the next one: its interval is that of the reading. */
function singleVerdict({ rpm, rpmLow, rpmHigh }: SessionPoint): Verdict {
  const speed = { value: rpm, low: rpmLow, high: rpmHigh };
  return {
    sentence: `One recording: ${uncertainSentence(speed, 'rpm')}.`,
    missing: ['A second recording under the same conditions, to tell the spread.'],
    figures: { meanSpeed: inRpm(speed) },
  };
}

function sweepVerdict(points: readonly SessionPoint[]): Verdict {
  const powered = points.filter((point) => point.supplyVolts !== null);
  const volts = powered.map(({ supplyVolts }) => supplyVolts ?? 0);
  const unpoweredCount = points.length - powered.length;
  const missing = unpoweredCount > 0 ? [`The supply voltage of ${recordings(unpoweredCount)}.`] : [];
  const motorCount = new Set(powered.map(({ motor }) => motor)).size;
  if (motorCount > 1) {
    return { sentence: 'The recordings are of several motors: a sweep is of one.', missing, figures: {} };
  }
  const voltageCount = new Set(volts).size;
  if (voltageCount < SWEEP_VOLTAGE_MINIMUM_COUNT) {
    const wanted = `Recordings at ${String(SWEEP_VOLTAGE_MINIMUM_COUNT)} voltages or more; there are ${String(voltageCount)}.`;
    return { sentence: 'Not enough voltages for a line yet.', missing: [...missing, wanted], figures: {} };
  }
  const speeds = powered.map(({ rpm }) => rpm);
  const misfit = lineMisfit({
    x: volts,
    y: speeds,
    allowance: powered.map(({ rpm, rpmLow, rpmHigh }) => Math.max((rpmHigh - rpmLow) / 2, RIGHT_SPEED_RATIO * rpm)),
  });
  const outside = powered[misfit?.index ?? -1];
  if (misfit !== null && outside !== undefined) return misfitVerdict(outside, misfit, missing);
  const { slope, zeroCrossing } = lineIntervals(volts, speeds);
  return {
    sentence: `Each volt adds ${uncertainSentence(slope, 'rpm')}.`,
    missing:
      zeroCrossing === null ? [...missing, 'More voltages, further apart: the line is not sure to rise.'] : missing,
    figures: {
      speedConstant: { ...slope, unit: 'rpm/V' },
      ...(zeroCrossing && { noLoadOffset: { ...zeroCrossing, unit: 'V' } }),
    },
  };
}

/** A line drawn through a wrong speed would be wrong for every voltage, so none is. */
function misfitVerdict({ supplyVolts, rpm }: SessionPoint, { expected }: LineMisfit, missing: string[]): Verdict {
  const at = `${plainNumberText(supplyVolts ?? 0)} V`;
  return {
    sentence: `The recording at ${at} (${numberText(rpm, 0)} rpm) does not fit the line of the others, which expect about ${numberText(expected.value, 0)} rpm there.`,
    missing: [
      ...missing,
      `A look at the recording at ${at}: choose its right speed or voltage, or mark it to be recorded again.`,
    ],
    figures: {},
  };
}

function inRpm(interval: Interval) {
  return { ...interval, unit: 'rpm' };
}

function repeatabilityOf({ value, low, high }: Interval): Interval {
  return { value: value * REPEATABILITY_FACTOR, low: low * REPEATABILITY_FACTOR, high: high * REPEATABILITY_FACTOR };
}

function recordings(count: number): string {
  return count === 1 ? '1 recording' : `${String(count)} recordings`;
}

function unsureWords(count: number): string {
  return `A person’s word on ${recordings(count)} whose speed is unsure; until then ${count === 1 ? 'it does' : 'they do'} not count.`;
}
