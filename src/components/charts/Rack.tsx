import { useRef, type KeyboardEvent, type PointerEvent } from 'react';
import { PLOT_LEFT_PX, PLOT_RIGHT_PX } from './plotStyle.ts';
import type { PlotRange } from './plotRange.ts';
import type { Tooth } from './teeth.ts';

interface Props {
  readonly teeth: readonly Tooth[];
  /** Distance of two teeth on the axis below. */
  readonly spacing: number;
  readonly range: PlotRange;
  /** The rack stands at the answer, and is copper; a rack that someone moved is ink. */
  readonly isAnswer: boolean;
  /** Teeth that a reason speaks of; null when none is pointed at. */
  readonly marked: readonly number[] | null;
  /** What the spacing means, for those who do not see it: "teeth every 287.4 Hz, 2874 rpm". */
  readonly meaning: string;
  readonly onSpacing?: ((spacing: number) => void) | undefined;
}

const HEIGHT_PX = 44;
const RULE_Y = 20;
const TOOTH_DEPTH = 18;
const STEP_FRACTION = 0.001;
const LONG_STEP_FRACTION = 0.01;
const LEAST_TOOTH_DISTANCE_FRACTION = 1 / 80;
const PER_CENT = 100;

/** The unrolled ring as a toothed rule: filled where a line was found, hollow where it is missing. Drag it or step it. */
export function Rack({ teeth, spacing, range, isAnswer, marked, meaning, onSpacing }: Props) {
  const rule = useRef<HTMLDivElement>(null);
  const grabbed = useRef<number | null>(null);
  const width = range.to - range.from;
  const everyNth = Math.max(1, Math.ceil((width * LEAST_TOOTH_DISTANCE_FRACTION) / spacing));
  const shown = teeth.filter(
    ({ multiple, position }) => multiple % everyNth === 0 && position >= range.from && position <= range.to,
  );
  const foundCount = shown.filter((tooth) => tooth.isFound).length;
  const placeOf = ({ clientX }: PointerEvent) => {
    const area = rule.current?.getBoundingClientRect();
    return area === undefined ? range.from : range.from + ((clientX - area.left) / area.width) * width;
  };
  const grab = (event: PointerEvent<HTMLDivElement>) => {
    grabbed.current = Math.max(1, Math.round(placeOf(event) / spacing));
    event.currentTarget.setPointerCapture(event.pointerId);
  };
  const drag = (event: PointerEvent) => {
    const place = placeOf(event);
    if (grabbed.current !== null && place > 0) onSpacing?.(place / grabbed.current);
  };
  const step = (event: KeyboardEvent) => {
    const factor = stepFactor(event);
    if (factor === null) return;
    event.preventDefault();
    onSpacing?.(spacing * factor);
  };
  return (
    <div style={{ paddingLeft: `${String(PLOT_LEFT_PX)}px`, paddingRight: `${String(PLOT_RIGHT_PX)}px` }}>
      <div
        ref={rule}
        role="slider"
        tabIndex={onSpacing ? 0 : -1}
        aria-label="Rack"
        aria-valuemin={range.from}
        aria-valuemax={range.to}
        aria-valuenow={spacing}
        aria-valuetext={`${meaning}; a line at ${String(foundCount)} of ${String(shown.length)} teeth`}
        onKeyDown={step}
        onPointerDown={grab}
        onPointerMove={drag}
        onPointerUp={() => (grabbed.current = null)}
        className={`touch-none ${onSpacing ? 'cursor-ew-resize' : ''} ${isAnswer ? 'text-copper' : 'text-ink'}`}
      >
        <svg width="100%" height={HEIGHT_PX} className="block overflow-hidden" aria-hidden="true">
          <line x1="0" x2="100%" y1={RULE_Y} y2={RULE_Y} stroke="currentColor" strokeWidth="3" />
          {shown.map((tooth) => (
            <ToothShape
              key={tooth.multiple}
              multiple={tooth.multiple}
              percent={((tooth.position - range.from) / width) * PER_CENT}
              isFilled={marked === null ? tooth.isFound : marked.includes(tooth.multiple)}
            />
          ))}
        </svg>
      </div>
    </div>
  );
}

function ToothShape({ multiple, percent, isFilled }: { multiple: number; percent: number; isFilled: boolean }) {
  return (
    <svg x={`${percent.toFixed(3)}%`} y="0" className="overflow-visible">
      <path
        d={`M-6 ${String(RULE_Y)}L-3.5 ${String(RULE_Y + TOOTH_DEPTH)}H3.5L6 ${String(RULE_Y)}Z`}
        className={isFilled ? 'fill-current' : 'fill-sheet'}
        stroke="currentColor"
        strokeWidth="1.5"
      />
      <text y={RULE_Y - 6} textAnchor="middle" fontSize="12" className="fill-muted figures">
        {multiple}
      </text>
    </svg>
  );
}

function stepFactor({ key, shiftKey }: KeyboardEvent): number | null {
  const fraction = shiftKey ? LONG_STEP_FRACTION : STEP_FRACTION;
  if (key === 'ArrowRight' || key === 'ArrowUp') return 1 + fraction;
  if (key === 'ArrowLeft' || key === 'ArrowDown') return 1 / (1 + fraction);
  if (key === 'PageUp') return 1 + LONG_STEP_FRACTION;
  if (key === 'PageDown') return 1 / (1 + LONG_STEP_FRACTION);
  return null;
}
