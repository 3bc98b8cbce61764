import { useState } from 'react';
import { Button } from '#components/ui/Button.tsx';
import type { SeriesName } from '#lib/analysis/series.ts';
import type { ReadingView } from '#lib/schemas/reading.ts';
import { SeriesSlot } from './SeriesSlot.tsx';
import { SpectrogramView } from './SpectrogramView.tsx';
import { WaveformView } from './WaveformView.tsx';

interface Props {
  readonly reading: ReadingView;
  readonly fileName: string;
  readonly onHearFrom: (timeSeconds: number) => void;
}

const SLOT_HEIGHT_PX = 320;

/** What stays closed until it is wanted: the spectrogram, and the waveform where the level is in doubt. */
export function MoreViews({ reading, fileName, onHearFrom }: Props) {
  const [opened, setOpened] = useState<SeriesName | null>(null);
  const isLevelInDoubt = reading.warnings.some((warning) => warning === 'clipped' || warning === 'low-level');
  const choices = [
    { name: 'spectrogram', words: 'the spectrogram', isOffered: true },
    { name: 'waveform', words: 'the level over time', isOffered: isLevelInDoubt || reading.status === 'no-rotation' },
  ] as const;
  return (
    <>
      <div className="flex flex-wrap gap-3 print:hidden">
        {choices
          .filter(({ name, isOffered }) => isOffered && reading.seriesNames.includes(name))
          .map(({ name, words }) => (
            <Button
              key={name}
              weight="word"
              aria-expanded={opened === name}
              onClick={() => {
                setOpened(opened === name ? null : name);
              }}
            >
              {opened === name ? 'Hide' : 'Show'} {words}
            </Button>
          ))}
      </div>
      {opened !== null && (
        <SeriesSlot key={`${reading.id} ${opened}`} readingId={reading.id} name={opened} heightPx={SLOT_HEIGHT_PX}>
          {(series) =>
            opened === 'spectrogram' ? (
              <SpectrogramView series={series} reading={reading} fileName={fileName} />
            ) : (
              <WaveformView series={series} fileName={fileName} onHearFrom={onHearFrom} />
            )
          }
        </SeriesSlot>
      )}
    </>
  );
}
