import { GroupedText } from '#components/ui/GroupedText.tsx';
import { axisPercent, type SpeedAxis } from './speedAxis.ts';

/** Labels closer than this, per cent of the axis, would run into each other on a phone. */
const LABEL_SPACE_PERCENT = 18;
const EDGE_PERCENT = 6;
const PER_CENT = 100;

/** The labels of a shared speed axis, rpm. */
export function SpeedScale({ axis }: { axis: SpeedAxis }) {
  return (
    <div className="relative h-5 text-small text-muted" aria-hidden="true">
      {labelledTicks(axis).map((rpm) => {
        const at = axisPercent(axis, rpm);
        return (
          <span
            key={rpm}
            className={`absolute whitespace-nowrap ${shiftAt(at)}`}
            style={{ insetInlineStart: `${String(at)}%` }}
          >
            <GroupedText text={String(rpm)} />
          </span>
        );
      })}
    </div>
  );
}

/** Centred under its tick; at the ends pulled in, so that nothing stands out of the axis. */
function shiftAt(percent: number): string {
  if (percent < EDGE_PERCENT) return '';
  return percent > PER_CENT - EDGE_PERCENT ? '-translate-x-full' : '-translate-x-1/2';
}

/** The ticks that have room for their label, from the left. */
export function labelledTicks(axis: SpeedAxis): number[] {
  const kept: number[] = [];
  let lastPercent = Number.NEGATIVE_INFINITY;
  for (const rpm of axis.ticksRpm) {
    const at = axisPercent(axis, rpm);
    if (at - lastPercent < LABEL_SPACE_PERCENT) continue;
    kept.push(rpm);
    lastPercent = at;
  }
  return kept;
}
