import { useState } from 'react';
import { ClientProvider } from '#client/ClientProvider.tsx';
import { WordSwitch } from '#components/ui/WordSwitch.tsx';
import type { ReadingView } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { eventHertzFromRpm } from '#lib/units/rotation.ts';
import { ProofView } from './ProofView.tsx';
import { speedOf } from './recordingStanding.ts';
import { Section } from './Section.tsx';
import { SeriesSlot } from './SeriesSlot.tsx';
import { useShownSpeed } from './shownSpeed.ts';
import { useRecording } from './useRecording.ts';

interface Props {
  readonly recording: RecordingView;
}

const VIEWS = [
  { key: 'spectrum', label: 'spectrum' },
  { key: 'envelopeSpectrum', label: 'envelope' },
  { key: 'orderSpectrum', label: 'order' },
] as const;
type ViewName = (typeof VIEWS)[number]['key'];

/** Events slower than this are no tone: they show in the envelope of the sound. */
const LOWEST_TONE_HZ = 40;
const SLOT_HEIGHT_PX = 500;

/** The proof in the sound: one spectrum, the rack above it, and what both say in sentences. */
export function Proof({ recording }: Props) {
  return (
    <ClientProvider>
      <LiveProof initial={recording} />
    </ClientProvider>
  );
}

function LiveProof({ initial }: { initial: RecordingView }) {
  const recording = useRecording(initial);
  const { reading } = recording;
  const shownRpm = useShownSpeed();
  const [picked, setPicked] = useState<ViewName | null>(null);
  const views = VIEWS.filter(({ key }) => reading?.seriesNames.includes(key));
  const [firstView] = views;
  if (reading === null || firstView === undefined) return null;
  const answerRpm = speedOf(recording)?.rpm ?? null;
  const rpm = shownRpm ?? answerRpm ?? reading.candidates[0]?.rpm ?? null;
  const view = views.find(({ key }) => key === (picked ?? bestView(reading, rpm))) ?? firstView;
  return (
    <Section title="Proof in the sound" sentence={sentenceOf(reading)}>
      {views.length > 1 && (
        <WordSwitch label="Kind of spectrum" choices={views} chosen={view.key} onChoose={setPicked} />
      )}
      <SeriesSlot key={`${reading.id} ${view.key}`} readingId={reading.id} name={view.key} heightPx={SLOT_HEIGHT_PX}>
        {(series) => (
          <ProofView
            series={series}
            viewName={view.label}
            reading={reading}
            rpm={rpm}
            answerRpm={answerRpm}
            isMoved={shownRpm !== null}
            fileName={recording.fileName}
          />
        )}
      </SeriesSlot>
    </Section>
  );
}

/** The spectrum in which the proof is plainest. */
function bestView({ motion, eventsPerTurn, seriesNames }: ReadingView, rpm: number | null): ViewName {
  // While the speed changes its lines smear; counted in turns they stand still.
  if (motion === 'varying' && seriesNames.includes('orderSpectrum')) return 'orderSpectrum';
  return rpm !== null && eventHertzFromRpm(rpm, eventsPerTurn) < LOWEST_TONE_HZ ? 'envelopeSpectrum' : 'spectrum';
}

function sentenceOf({ status, candidates }: ReadingView): string {
  return status === 'measured'
    ? 'If the speed is right, the sound has a line at every tooth of the rack.'
    : candidates.length > 0
      ? 'No rack fits this sound well; the one shown is the best of the candidates.'
      : 'No speed fits this sound well enough to hold a rack against it.';
}
