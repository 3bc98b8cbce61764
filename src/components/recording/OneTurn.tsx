import { useMemo } from 'react';
import { ClientProvider } from '#client/ClientProvider.tsx';
import { OneTurnChart } from '#components/charts/OneTurnChart.tsx';
import { numberText, plainNumberText } from '#lib/format/numberText.ts';
import type { ReadingView, SeriesView } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { evenness } from './oneTurnWords.ts';
import { Section } from './Section.tsx';
import { fullColumn, gapColumn } from './seriesColumns.ts';
import { SeriesSlot } from './SeriesSlot.tsx';
import { useRecording } from './useRecording.ts';

interface Props {
  readonly recording: RecordingView;
}

const SLOT_HEIGHT_PX = 320;
const PER_CENT = 100;

function bumpsWords(eventsPerTurn: number): string {
  return eventsPerTurn === 1 ? 'one bump on the whole' : `${plainNumberText(eventsPerTurn)} bumps, each on its part`;
}

/** The average of all turns over the unrolled ring: whether every contact sounds like the others. */
export function OneTurn({ recording }: Props) {
  return (
    <ClientProvider>
      <LiveOneTurn initial={recording} />
    </ClientProvider>
  );
}

function LiveOneTurn({ initial }: { initial: RecordingView }) {
  const recording = useRecording(initial);
  const { reading } = recording;
  if (!reading?.seriesNames.includes('oneTurnAverage')) return null;
  return (
    <Section
      title="One turn"
      sentence={`All turns laid over each other: ${bumpsWords(reading.eventsPerTurn)} of the unrolled ring.`}
    >
      <SeriesSlot key={reading.id} readingId={reading.id} name="oneTurnAverage" heightPx={SLOT_HEIGHT_PX}>
        {(series) => <Turn series={series} reading={reading} fileName={recording.fileName} />}
      </SeriesSlot>
    </Section>
  );
}

function Turn({ series, reading, fileName }: { series: SeriesView; reading: ReadingView; fileName: string }) {
  const turnFraction = useMemo(() => fullColumn(series, 'turnFraction'), [series]);
  const level = useMemo(() => gapColumn(series, 'level'), [series]);
  const result = evenness(level, reading.eventsPerTurn);
  return (
    <div className="columns-12">
      <div className="min-w-0 bg-sheet p-3 desk:col-span-8">
        <OneTurnChart
          title={`One turn of ${fileName}`}
          fileName={`${fileName} one turn`}
          turnFraction={turnFraction}
          level={level}
          eventsPerTurn={reading.eventsPerTurn}
        />
      </div>
      {result !== null && (
        <div className="desk:col-span-4">
          <p className="text-title">{result.word === 'even' ? 'Even' : 'Uneven contacts'}</p>
          <p>The bumps differ by {numberText(result.spreadFraction * PER_CENT, 0)} % of their height.</p>
        </div>
      )}
    </div>
  );
}
