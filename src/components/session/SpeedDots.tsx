import type { MeasuredSpeed } from '#components/recording/recordingStanding.ts';
import { axisPercent, type SpeedAxis } from './speedAxis.ts';

export interface SpeedDot extends MeasuredSpeed {
  readonly recordingId: string;
  /** Drawn hollow: it may be half or double. */
  readonly isUnsure: boolean;
}

interface Props {
  readonly axis: SpeedAxis;
  readonly dots: readonly SpeedDot[];
  /** Drawn copper and last, so that nothing covers it. */
  readonly newestId: string | null;
}

const HEIGHT_PX = 28;
const MIDDLE = HEIGHT_PX / 2;
const percent = (value: number) => `${value.toFixed(2)}%`;

/** Speeds as dots with their intervals on a shared axis. The figures stand in words beside it. */
export function SpeedDots({ axis, dots, newestId }: Props) {
  const inDrawingOrder = dots.toSorted(
    (a, b) => Number(a.recordingId === newestId) - Number(b.recordingId === newestId),
  );
  return (
    <svg width="100%" height={HEIGHT_PX} aria-hidden="true" className="block overflow-visible">
      <line x1="0" x2="100%" y1={MIDDLE} y2={MIDDLE} className="stroke-line" />
      {axis.ticksRpm.map((rpm) => (
        <line
          key={rpm}
          x1={percent(axisPercent(axis, rpm))}
          x2={percent(axisPercent(axis, rpm))}
          y1={MIDDLE - 3}
          y2={MIDDLE + 3}
          className="stroke-control"
        />
      ))}
      {inDrawingOrder.map((dot) => (
        <Dot key={dot.recordingId} axis={axis} dot={dot} isNewest={dot.recordingId === newestId} />
      ))}
    </svg>
  );
}

function Dot({ axis, dot, isNewest }: { axis: SpeedAxis; dot: SpeedDot; isNewest: boolean }) {
  return (
    <g className={isNewest ? 'fill-copper stroke-copper' : 'fill-ink stroke-ink'}>
      <line
        x1={percent(axisPercent(axis, dot.rpmLow))}
        x2={percent(axisPercent(axis, dot.rpmHigh))}
        y1={MIDDLE}
        y2={MIDDLE}
        strokeWidth={2}
      />
      <circle
        cx={percent(axisPercent(axis, dot.rpm))}
        cy={MIDDLE}
        r={isNewest ? 6 : 4}
        {...(dot.isUnsure
          ? { className: 'fill-ground', strokeWidth: 2 }
          : { className: 'stroke-ground', strokeWidth: 1 })}
      />
    </g>
  );
}
