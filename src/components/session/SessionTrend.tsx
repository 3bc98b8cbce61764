import { WordSwitch } from '#components/ui/WordSwitch.tsx';
import { SessionTrendChart } from './SessionTrendChart.tsx';
import type { SpeedAxis } from './speedAxis.ts';
import type { TrendBy, TrendPoint } from './trendPlot.ts';

interface Props {
  readonly points: readonly TrendPoint[];
  readonly axis: SpeedAxis | null;
  readonly by: TrendBy;
  readonly onBy: (by: TrendBy) => void;
  readonly newestId: string | null;
}

const CHOICES = [
  { key: 'order', label: 'in order' },
  { key: 'supply', label: 'by supply' },
] as const;

/** The session's speeds as a chart, or what it takes to get one. */
export function SessionTrend({ points, axis, by, onBy, newestId }: Props) {
  const hasVolts = points.some(({ supplyVolts }) => supplyVolts !== null);
  const shownBy = hasVolts ? by : 'order';
  return (
    <section aria-labelledby="trend-heading">
      <div className="flex flex-wrap items-baseline justify-between gap-x-6">
        <h2 id="trend-heading">Speed over the recordings</h2>
        {hasVolts && <WordSwitch label="Lay the recordings out" choices={CHOICES} chosen={shownBy} onChoose={onBy} />}
      </div>
      {axis === null ? (
        <p className="mt-2 max-w-sentence text-muted">
          Each measured recording becomes a dot here, with its 95 % interval. Two recordings already show a trend.
        </p>
      ) : (
        <div className="bg-sheet p-3">
          <SessionTrendChart
            title="Speed over the recordings"
            points={points}
            axis={axis}
            by={shownBy}
            newestId={newestId}
          />
        </div>
      )}
    </section>
  );
}
