import { GroupedText } from '#components/ui/GroupedText.tsx';
import { axisPercent, type SpeedAxis } from './speedAxis.ts';

/** Labels closer than this, per cent of the axis, would run into each other on a phone. */
const LABEL_SPACE_PERCENT = 16;

/** The labels of a shared speed axis, rpm. */
export function SpeedScale({ axis }: { axis: SpeedAxis }) {
  return (
    <div className="relative h-5 text-small text-muted" aria-hidden="true">
      {labelledTicks(axis).map((rpm) => {
        const at = axisPercent(axis, rpm);
        return (
          <span
            key={rpm}
            className="absolute -translate-x-1/2 whitespace-nowrap"
            style={{ insetInlineStart: `${String(at)}%` }}
          >
            <GroupedText text={String(rpm)} />
          </span>
        );
      })}
    </div>
  );
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
