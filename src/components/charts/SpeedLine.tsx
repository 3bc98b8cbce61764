import type { PointerEvent } from 'react';
import { digitGroups } from '#components/ui/digitGroups.ts';
import { numberText } from '#lib/format/numberText.ts';
import { decadeTicks, logFraction, type SpeedRange } from './speedAxis.ts';

interface LineCandidate {
  readonly shaftSpeedRpm: number;
  /** Relative weight, [0, 1]. */
  readonly score: number;
}

interface Props extends SpeedRange {
  /** Best first. */
  readonly candidates: readonly LineCandidate[];
  /** Must be the speed of one of the candidates, or of none when nothing is chosen. */
  readonly chosenRpm: number | null;
  /** 95 % interval of the chosen speed, drawn as its whisker. */
  readonly lowRpm: number | null;
  readonly highRpm: number | null;
  /** A press on the line chooses the nearest candidate; the keyboard has the list beside it. */
  readonly onChoose?: ((shaftSpeedRpm: number) => void) | undefined;
}

const HEIGHT_PX = 132;
const LINE_Y = 84;
const TALLEST_TICK_PX = 48;
const SHORTEST_TICK_PX = 8;
const PER_CENT = 100;
/** Two speeds are the same candidate within this fraction. */
const SAME_FRACTION = 0.01;

/** All speeds that the sound could mean, on one logarithmic line over the allowed range. */
export function SpeedLine(props: Props) {
  const { candidates, chosenRpm, lowRpm, highRpm, onChoose } = props;
  const percent = (rpm: number) => `${(logFraction(rpm, props) * PER_CENT).toFixed(3)}%`;
  const choose = (event: PointerEvent<SVGSVGElement>) => {
    const area = event.currentTarget.getBoundingClientRect();
    const nearest = nearestCandidate(candidates, (event.clientX - area.left) / area.width, props);
    if (nearest) onChoose?.(nearest.shaftSpeedRpm);
  };
  return (
    <svg
      width="100%"
      height={HEIGHT_PX}
      className={`block overflow-visible ${onChoose ? 'cursor-pointer' : ''}`}
      aria-hidden="true"
      onPointerUp={choose}
    >
      <rect width="100%" height={HEIGHT_PX} fill="transparent" />
      <line x1="0" x2="100%" y1={LINE_Y} y2={LINE_Y} className="stroke-control" strokeWidth="1" />
      {decadeTicks(props).map(({ rpm, isLabelled }) => (
        <svg key={rpm} x={percent(rpm)} y={LINE_Y} className="overflow-visible">
          <line y2={isLabelled ? 8 : 4} className="stroke-control" />
          {isLabelled && (
            <text y="26" fontSize="14" textAnchor={anchorOf(logFraction(rpm, props))} className="fill-muted">
              <Grouped rpm={rpm} />
            </text>
          )}
        </svg>
      ))}
      {candidates.map(({ shaftSpeedRpm, score }) => (
        <line
          key={shaftSpeedRpm}
          x1={percent(shaftSpeedRpm)}
          x2={percent(shaftSpeedRpm)}
          y1={LINE_Y}
          y2={LINE_Y - tickHeight(score)}
          className={isSame(shaftSpeedRpm, chosenRpm) ? 'stroke-copper' : 'stroke-ink'}
          strokeWidth={isSame(shaftSpeedRpm, chosenRpm) ? 4 : 2}
        />
      ))}
      {chosenRpm !== null && (
        <>
          <Words
            of={[
              ['half', chosenRpm / 2],
              ['double', chosenRpm * 2],
            ]}
            range={props}
          />
          {lowRpm !== null && highRpm !== null && (
            <line
              x1={percent(lowRpm)}
              x2={percent(highRpm)}
              y1={LINE_Y + 4}
              y2={LINE_Y + 4}
              className="stroke-copper"
              strokeWidth="4"
              strokeLinecap="square"
            />
          )}
          <svg x={percent(chosenRpm)} y={LINE_Y - TALLEST_TICK_PX - 10} className="overflow-visible">
            <text
              fontSize="16"
              fontWeight="700"
              textAnchor={anchorOf(logFraction(chosenRpm, props))}
              className="fill-copper"
            >
              <Grouped rpm={chosenRpm} /> rpm
            </text>
          </svg>
        </>
      )}
    </svg>
  );
}

function Words({ of, range }: { of: readonly (readonly [string, number])[]; range: SpeedRange }) {
  return of
    .filter(([, rpm]) => rpm >= range.minimumRpm && rpm <= range.maximumRpm)
    .map(([word, rpm]) => (
      <svg key={word} x={`${String(logFraction(rpm, range) * PER_CENT)}%`} y={LINE_Y} className="overflow-visible">
        <line y2="-8" className="stroke-control" strokeDasharray="2 2" />
        <text y="44" fontSize="14" textAnchor={anchorOf(logFraction(rpm, range))} className="fill-ink">
          {word}
        </text>
      </svg>
    ));
}

/** SVG text knows no margins: the gap between the groups is a shift of the pen. */
function Grouped({ rpm }: { rpm: number }) {
  return digitGroups(numberText(rpm, 0)).map((group, index) => (
    <tspan key={index} dx={index === 0 ? undefined : '0.18em'}>
      {group}
    </tspan>
  ));
}

function tickHeight(score: number): number {
  return SHORTEST_TICK_PX + (TALLEST_TICK_PX - SHORTEST_TICK_PX) * Math.min(1, Math.max(0, score));
}

function isSame(rpm: number, other: number | null): boolean {
  return other !== null && Math.abs(rpm - other) <= other * SAME_FRACTION;
}

function nearestCandidate(candidates: readonly LineCandidate[], fraction: number, range: SpeedRange) {
  const distance = ({ shaftSpeedRpm }: LineCandidate) => Math.abs(logFraction(shaftSpeedRpm, range) - fraction);
  return [...candidates].sort((a, b) => distance(a) - distance(b))[0];
}

function anchorOf(fraction: number): 'start' | 'middle' | 'end' {
  if (fraction < 0.06) return 'start';
  return fraction > 0.94 ? 'end' : 'middle';
}
