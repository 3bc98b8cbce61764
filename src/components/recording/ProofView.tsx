import { useMemo, useState } from 'react';
import { SpectrumChart } from '#components/charts/SpectrumChart.tsx';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import { numberText } from '#lib/format/numberText.ts';
import type { ReadingView, SeriesView } from '#lib/schemas/reading.ts';
import { eventHertzFromRpm } from '#lib/units/rotation.ts';
import { proofReasons } from './proofReasons.ts';
import { RackSpeed } from './RackSpeed.tsx';
import { isHalfPossible } from './rivals.ts';
import { fullColumn, gapColumn } from './seriesColumns.ts';
import { showSpeed } from './shownSpeed.ts';

interface Props {
  readonly series: SeriesView;
  readonly viewName: string;
  readonly reading: ReadingView;
  /** The speed that the rack stands for; null when there is no candidate at all. */
  readonly rpm: number | null;
  readonly answerRpm: number | null;
  /** Someone holds the rack somewhere else than at the reading. */
  readonly isMoved: boolean;
  readonly fileName: string;
}

/** One spectrum with its rack, 8 columns, and the reasons that it gives, 4 columns. */
export function ProofView({ series, viewName, reading, rpm, answerRpm, isMoved, fileName }: Props) {
  const [marked, setMarked] = useState<readonly number[] | null>(null);
  const isOrder = series.name === 'orderSpectrum';
  const unit = isOrder ? 'orders' : 'Hz';
  const positions = useMemo(() => fullColumn(series, isOrder ? 'order' : 'frequencyHz'), [series, isOrder]);
  const levels = useMemo(() => gapColumn(series, 'levelDecibels'), [series]);
  const homeRpm = answerRpm ?? reading.candidates[0]?.rpm ?? null;
  // Orders are counted in turns of the reading's own speed; another speed squeezes or stretches the rack.
  const spacingAt = (shaftRpm: number) =>
    isOrder
      ? (reading.eventsPerTurn * shaftRpm) / (reading.rpm ?? shaftRpm)
      : eventHertzFromRpm(shaftRpm, reading.eventsPerTurn);
  const spacing = rpm === null ? null : spacingAt(rpm);
  const reasons =
    rpm === null || spacing === null
      ? []
      : proofReasons(positions, levels, {
          spacing,
          unit,
          eventsPerTurn: reading.eventsPerTurn,
          isHalfPossible: isHalfPossible(reading, rpm),
        });
  return (
    <div className="columns-12">
      <div className="min-w-0 bg-sheet p-3 desk:col-span-8">
        <SpectrumChart
          title={`${viewName === 'spectrum' ? 'Spectrum' : `${viewName} spectrum`} of ${fileName}`}
          fileName={`${fileName} ${viewName}`}
          positions={positions}
          positionUnit={unit}
          levelDecibels={levels}
          toothSpacing={spacing}
          homeSpacing={homeRpm === null ? null : spacingAt(homeRpm)}
          isAnswer={answerRpm !== null && !isMoved}
          markedTeeth={marked}
          rackMeaning={
            spacing === null ? '' : `A tooth every ${numberText(spacing, 1)} ${unit}, ${numberText(rpm ?? 0, 0)} rpm`
          }
          onToothSpacing={(next) => {
            if (spacing !== null && rpm !== null) showSpeed((rpm * next) / spacing);
          }}
        />
      </div>
      <div className="grid content-start gap-4 desk:col-span-4">
        {rpm !== null && <RackSpeed rpm={rpm} isMoved={isMoved} eventsPerTurn={reading.eventsPerTurn} />}
        <ul className="grid gap-1">
          {reasons.map(({ text, teeth }) => (
            <li key={text}>
              <button
                type="button"
                className="w-full border-l-[3px] border-line py-2 pl-3 text-start touch hover:border-ink focus-visible:border-ink"
                onPointerEnter={() => {
                  setMarked(teeth);
                }}
                onPointerLeave={() => {
                  setMarked(null);
                }}
                onFocus={() => {
                  setMarked(teeth);
                }}
                onBlur={() => {
                  setMarked(null);
                }}
              >
                <GroupedText text={text} />
              </button>
            </li>
          ))}
        </ul>
      </div>
    </div>
  );
}
