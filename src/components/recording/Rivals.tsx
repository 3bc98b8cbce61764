import { ClientProvider } from '#client/ClientProvider.tsx';
import { SpeedLine } from '#components/charts/SpeedLine.tsx';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import type { ReadingView } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { CandidatesTable } from './CandidatesTable.tsx';
import { speedOf } from './recordingStanding.ts';
import { isSameSpeed, whyNotTexts } from './rivals.ts';
import { showSpeed, useShownSpeed } from './shownSpeed.ts';
import { useRecording } from './useRecording.ts';

interface Props {
  readonly recording: RecordingView;
}

/** The rivals: every speed that the sound could mean, and why it is not half or double. */
export function Rivals({ recording }: Props) {
  return (
    <ClientProvider>
      <LiveRivals initial={recording} />
    </ClientProvider>
  );
}

function LiveRivals({ initial }: { initial: RecordingView }) {
  const recording = useRecording(initial);
  const shownRpm = useShownSpeed();
  const { reading } = recording;
  if (reading === null || reading.candidates.length === 0) return null;
  const answer = speedOf(recording);
  const lookedAt =
    shownRpm === null ? null : (reading.candidates.find(({ rpm }) => isSameSpeed(rpm, shownRpm)) ?? null);
  const chosenRpm = lookedAt?.rpm ?? answer?.rpm ?? null;
  const isAnswer = answer !== null && chosenRpm === answer.rpm;
  const look = (rpm: number) => {
    showSpeed(answer !== null && isSameSpeed(rpm, answer.rpm) ? null : rpm);
  };
  return (
    <section aria-labelledby="rivals" className="mt-8">
      <h2 id="rivals">What else it could be</h2>
      <SpeedLine
        minimumRpm={reading.settings.rpmMin}
        maximumRpm={reading.settings.rpmMax}
        candidates={reading.candidates.map(({ rpm, score }) => ({ shaftSpeedRpm: rpm, score }))}
        chosenRpm={chosenRpm}
        lowRpm={isAnswer ? answer.rpmLow : null}
        highRpm={isAnswer ? answer.rpmHigh : null}
        onChoose={look}
      />
      <WhyNot reading={reading} chosenRpm={chosenRpm} />
      <CandidatesTable
        candidates={reading.candidates}
        chosenRpm={chosenRpm}
        answerRpm={answer?.rpm ?? null}
        onLook={look}
      />
    </section>
  );
}

function WhyNot({ reading, chosenRpm }: { reading: ReadingView; chosenRpm: number | null }) {
  if (chosenRpm === null) {
    return <p className="max-w-sentence">This is what it would be if something did turn.</p>;
  }
  return (
    <p className="mt-2 max-w-sentence">
      <GroupedText text={whyNotTexts(reading, chosenRpm).join(' ')} />
    </p>
  );
}
