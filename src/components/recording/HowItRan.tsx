import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { ClientProvider } from '#client/ClientProvider.tsx';
import { seriesQuery } from '#client/queries/readings.ts';
import { TrendChart } from '#components/charts/TrendChart.tsx';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import type { SeriesName } from '#lib/analysis/series.ts';
import type { ReadingView, SeriesView } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { Listening } from './Listening.tsx';
import { MoreViews } from './MoreViews.tsx';
import { Section } from './Section.tsx';
import { fullColumn, gapColumn } from './seriesColumns.ts';
import { SeriesSlot } from './SeriesSlot.tsx';
import { trendSentence } from './trendSentence.ts';
import { useListening } from './useListening.ts';
import { useRecording } from './useRecording.ts';

interface Props {
  readonly recording: RecordingView;
}

const SLOT_HEIGHT_PX = 400;

/** How it ran: the speed over time, and the sound from any moment of it. */
export function HowItRan({ recording }: Props) {
  return (
    <ClientProvider>
      <LiveHowItRan initial={recording} />
    </ClientProvider>
  );
}

function LiveHowItRan({ initial }: { initial: RecordingView }) {
  const recording = useRecording(initial);
  const listening = useListening();
  const { reading } = recording;
  if (reading === null) return null;
  const has = (name: SeriesName) => reading.seriesNames.includes(name);
  if (!has('trend') && !has('waveform') && !has('spectrogram')) return null;
  return (
    <Section title="How it ran" sentence={<TrendSentence reading={reading} />}>
      {has('trend') && (
        <SeriesSlot key={reading.id} readingId={reading.id} name="trend" heightPx={SLOT_HEIGHT_PX}>
          {(series) => <Trend series={series} fileName={recording.fileName} onHearFrom={listening.hearFrom} />}
        </SeriesSlot>
      )}
      <Listening recording={recording} listening={listening} />
      <MoreViews reading={reading} fileName={recording.fileName} onHearFrom={listening.hearFrom} />
    </Section>
  );
}

function TrendSentence({ reading }: { reading: ReadingView }) {
  const { data } = useQuery({ ...seriesQuery(reading.id, 'trend'), enabled: reading.seriesNames.includes('trend') });
  if (reading.motion === 'none') return 'Nothing turning was followed; listen to it yourself.';
  if (!data) return 'The speed over time, with its 95 % band.';
  return <GroupedText text={trendSentence(gapColumn(data, 'shaftSpeedRpm'), reading.motion)} />;
}

function Trend({
  series,
  fileName,
  onHearFrom,
}: {
  series: SeriesView;
  fileName: string;
  onHearFrom: (seconds: number) => void;
}) {
  const [columns] = useState(() => ({
    timeSeconds: fullColumn(series, 'timeSeconds'),
    shaftSpeedRpm: gapColumn(series, 'shaftSpeedRpm'),
    lowRpm: gapColumn(series, 'lowRpm'),
    highRpm: gapColumn(series, 'highRpm'),
  }));
  return (
    <div className="bg-sheet p-3">
      <TrendChart
        title={`Shaft speed over time of ${fileName}`}
        fileName={`${fileName} trend`}
        {...columns}
        onHearFrom={onHearFrom}
      />
    </div>
  );
}
