import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { seriesQuery } from '#client/queries/readings.ts';
import { SpectrogramChart } from '#components/charts/SpectrogramChart.tsx';
import type { ReadingView, SeriesView } from '#lib/schemas/reading.ts';
import { eventHertzFromRpm } from '#lib/units/rotation.ts';
import { fullColumn, gapColumn } from './seriesColumns.ts';

interface Props {
  readonly series: SeriesView;
  readonly reading: ReadingView;
  readonly fileName: string;
}

/** The spectrogram with the event rate of the trend on it. */
export function SpectrogramView({ series, reading, fileName }: Props) {
  const { data: trend } = useQuery({
    ...seriesQuery(reading.id, 'trend'),
    enabled: reading.seriesNames.includes('trend'),
  });
  const columns = useMemo(
    () => ({
      timeSeconds: fullColumn(series, 'timeSeconds'),
      frequencyHz: fullColumn(series, 'frequencyHz'),
      levelDecibels: gapColumn(series, 'levelDecibels'),
    }),
    [series],
  );
  const eventHz = useMemo(
    () =>
      trend ? eventRateAt(columns.timeSeconds, trend, reading.eventsPerTurn) : columns.timeSeconds.map(() => null),
    [columns, trend, reading.eventsPerTurn],
  );
  return (
    <div className="bg-sheet p-3">
      <SpectrogramChart
        title={`Spectrogram of ${fileName}`}
        fileName={`${fileName} event rate`}
        {...columns}
        eventHz={eventHz}
      />
    </div>
  );
}

/** The event rate at each of the given times: that of the trend point nearest in time. */
function eventRateAt(timeSeconds: readonly number[], trend: SeriesView, eventsPerTurn: number): (number | null)[] {
  const times = fullColumn(trend, 'timeSeconds');
  const speeds = gapColumn(trend, 'shaftSpeedRpm');
  let nearest = 0;
  return timeSeconds.map((time) => {
    const distance = (index: number) => Math.abs((times[index] ?? Infinity) - time);
    while (nearest + 1 < times.length && distance(nearest + 1) <= distance(nearest)) nearest += 1;
    const rpm = speeds[nearest] ?? null;
    return rpm === null ? null : eventHertzFromRpm(rpm, eventsPerTurn);
  });
}
