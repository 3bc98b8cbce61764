import { useMemo } from 'react';
import { WaveformChart } from '#components/charts/WaveformChart.tsx';
import type { SeriesView } from '#lib/schemas/reading.ts';
import { fullColumn, gapColumn } from './seriesColumns.ts';

interface Props {
  readonly series: SeriesView;
  readonly fileName: string;
  readonly onHearFrom: (timeSeconds: number) => void;
}

/** The level over time, for doubts about clipping or a sound too quiet. */
export function WaveformView({ series, fileName, onHearFrom }: Props) {
  const columns = useMemo(
    () => ({
      timeSeconds: fullColumn(series, 'timeSeconds'),
      minimum: gapColumn(series, 'minimum'),
      maximum: gapColumn(series, 'maximum'),
    }),
    [series],
  );
  return (
    <div className="bg-sheet p-3">
      <WaveformChart
        title={`Level over time of ${fileName}`}
        fileName={`${fileName} level`}
        {...columns}
        onHearFrom={onHearFrom}
      />
    </div>
  );
}
