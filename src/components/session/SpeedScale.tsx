import { GroupedText } from '#components/ui/GroupedText.tsx';
import { anchorAt, ticksWithRoom } from './axisLabels.ts';
import { axisPercent, type SpeedAxis } from './speedAxis.ts';

/** What a digit and the gap behind a label take on an axis of 17, 21 and 36 rem, and how a label is left out there. */
const WIDTHS = [
  { digitPercent: 3.7, gapPercent: 3.5, leftOut: '@max-[21rem]:hidden' },
  { digitPercent: 3, gapPercent: 3, leftOut: '@min-[21rem]:@max-[36rem]:hidden' },
  { digitPercent: 1.8, gapPercent: 1.8, leftOut: '@min-[36rem]:hidden' },
] as const;
const SHIFTS = { start: '', middle: '-translate-x-1/2', end: '-translate-x-full' } as const;

/** The labels of a shared speed axis, rpm; on a narrow axis fewer of them. */
export function SpeedScale({ axis }: { axis: SpeedAxis }) {
  const tiers = WIDTHS.map((width) => ({ ...width, kept: ticksWithRoom(axis, width) }));
  return (
    <div className="@container relative h-5 text-small text-muted" aria-hidden="true">
      {axis.ticksRpm.map((rpm) => {
        const at = axisPercent(axis, rpm);
        const leftOut = tiers.flatMap((tier) => (tier.kept.includes(rpm) ? [] : [tier.leftOut]));
        return (
          <span
            key={rpm}
            className={`absolute whitespace-nowrap ${SHIFTS[anchorAt(at)]} ${leftOut.join(' ')}`}
            style={{ insetInlineStart: `${String(at)}%` }}
          >
            <GroupedText text={String(rpm)} />
          </span>
        );
      })}
    </div>
  );
}
