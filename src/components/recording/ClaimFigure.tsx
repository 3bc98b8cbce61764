import { GroupedText } from '#components/ui/GroupedText.tsx';
import { StateMark } from '#components/ui/StateMark.tsx';
import { UNSURE_BELOW_CONFIDENCE } from '#lib/analysis/reading.ts';
import { numberText } from '#lib/format/numberText.ts';
import { uncertainText } from '#lib/format/uncertainText.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { eventsSentence, wrongCountTexts } from './eventsWords.ts';
import {
  confidenceWords,
  firstChanceWords,
  failureAdvice,
  MOTION_WORDS,
  NO_ROTATION_EXPLANATIONS,
  UNSURE_ADVICE,
  warningWords,
} from './readingWords.ts';
import { speedOf } from './recordingStanding.ts';

interface Props {
  readonly recording: RecordingView;
}

const NO_BREAK_SPACE = '\u00a0';

/** The biggest thing on the page: the figure with its interval and its meaning, or the words in its place. */
export function ClaimFigure({ recording }: Props) {
  const { status, reading, review } = recording;
  if (status === 'failed') return <Failed recording={recording} />;
  if (reading === null) return <Waiting isWorking={status === 'working'} />;
  const speed = speedOf(recording);
  const isUnsure = reading.confidence !== null && reading.confidence < UNSURE_BELOW_CONFIDENCE;
  if (review === null && isUnsure) return <Unsure recording={recording} />;
  if (speed === null) return <NothingTurning recording={recording} />;
  return <Measured recording={recording} speed={speed} />;
}

function Measured({ recording, speed }: Props & { speed: NonNullable<ReturnType<typeof speedOf>> }) {
  const { reading, review, build } = recording;
  if (reading === null) return null;
  const text = uncertainText({ value: speed.rpm, low: speed.rpmLow, high: speed.rpmHigh });
  const geometry = build?.geometry ?? null;
  const trust = review === null ? confidenceWords(reading.confidence ?? 0) : 'Looked at by a person';
  const wrongCounts = wrongCountTexts({ rpm: speed.rpm, eventsPerTurn: reading.eventsPerTurn }, geometry);
  return (
    <>
      <h1 className="figure-mark figures text-figure leading-none font-normal">
        <GroupedText text={text.value} />
        <span className="ml-1 font-sans text-title">{NO_BREAK_SPACE}rpm</span>
      </h1>
      <p className="text-title">
        between <GroupedText text={text.low} /> and <GroupedText text={text.high} />{' '}
        <span className="text-body">(95 %)</span>
      </p>
      <p className="max-w-sentence text-lead">
        {MOTION_WORDS[reading.motion]}. {trust}. {eventsSentence(reading.eventsPerTurn, geometry)}
      </p>
      {wrongCounts.length > 0 && (
        <p className="max-w-sentence text-muted">
          With a wrong count: <GroupedText text={wrongCounts.join('; ')} />.
        </p>
      )}
      <Warnings recording={recording} />
    </>
  );
}

function Unsure({ recording }: Props) {
  const [first, second] = recording.reading?.candidates ?? [];
  const speeds = [first, second].flatMap((candidate) => (candidate ? [`${numberText(candidate.rpm, 0)} rpm`] : []));
  return (
    <>
      <Words>Unsure</Words>
      <p className="text-title">
        <StateMark shape="undecided">
          <GroupedText text={speeds.join(' or ')} />
        </StateMark>
      </p>
      <p className="max-w-sentence text-lead">
        {firstChanceWords(recording.reading?.confidence ?? 0)} {UNSURE_ADVICE}
      </p>
      <Warnings recording={recording} />
    </>
  );
}

function NothingTurning({ recording }: Props) {
  const { reading, review } = recording;
  const explanation = reading?.reason == null ? null : NO_ROTATION_EXPLANATIONS[reading.reason];
  return (
    <>
      <Words>{review?.decision === 'record-again' ? 'To be recorded again' : 'Nothing turning heard'}</Words>
      {explanation !== null && (
        <>
          <p className="max-w-sentence text-title">{explanation.why}</p>
          <p className="max-w-sentence text-lead">{explanation.whatDecides}</p>
        </>
      )}
      <Warnings recording={recording} />
    </>
  );
}

function Failed({ recording: { error } }: Props) {
  return (
    <>
      <Words>Not analysed</Words>
      <p className="max-w-sentence text-title">
        <StateMark shape="outside">{error?.message ?? 'The analysis failed.'}</StateMark>
      </p>
      <p className="max-w-sentence text-lead">{failureAdvice(error?.code ?? '')}</p>
      <p className="text-muted">
        The original is kept with its hash. Code: <code>{error?.code ?? 'unknown'}</code>
      </p>
    </>
  );
}

function Waiting({ isWorking }: { isWorking: boolean }) {
  return (
    <>
      <Words>{isWorking ? 'Being analysed' : 'Waiting'}</Words>
      <p className="max-w-sentence text-lead">
        {isWorking
          ? 'The reading comes in a few seconds and appears here by itself.'
          : 'It is stored safely and will be analysed next.'}{' '}
        You can leave this page; nothing is lost.
      </p>
    </>
  );
}

function Words({ children }: { children: string }) {
  return <h1 className="text-figure leading-none font-normal text-balance">{children}</h1>;
}

function Warnings({ recording: { reading, media } }: Props) {
  if (reading === null || reading.warnings.length === 0) return null;
  const lengths = { usableSeconds: reading.durationSeconds, declaredSeconds: media.durationSeconds };
  return (
    <ul className="max-w-sentence text-body">
      {reading.warnings.map((warning) => (
        <li key={warning}>
          <StateMark shape="flagged">{warningWords(warning, lengths)}</StateMark>
        </li>
      ))}
    </ul>
  );
}
