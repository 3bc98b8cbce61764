import { numberText, plainNumberText } from '#lib/format/numberText.ts';
import { leastCommonMultiple } from '#lib/motor/leastCommonMultiple.ts';
import type { Geometry } from '#lib/schemas/build.ts';

const COUNTS = [
  'No',
  'One',
  'Two',
  'Three',
  'Four',
  'Five',
  'Six',
  'Seven',
  'Eight',
  'Nine',
  'Ten',
  'Eleven',
  'Twelve',
];
/** Brush sites when nobody counted the poles. */
const USUAL_POLES = 2;
/** Segment counts of small commutators. */
const USUAL_SEGMENTS = [2, 3, 5, 7];
const MOST_WRONG_COUNTS = 2;

/** The count behind the figure: "Six ripples a turn: 3 segments × 2 poles." */
export function eventsSentence(eventsPerTurn: number, geometry: Geometry | null): string {
  const { noun, because } = origin(eventsPerTurn, geometry);
  const count = COUNTS[eventsPerTurn] ?? plainNumberText(eventsPerTurn);
  return `${count} ${eventsPerTurn === 1 ? noun : `${noun}s`} a turn${because}.`;
}

function origin(eventsPerTurn: number, geometry: Geometry | null): { noun: string; because: string } {
  const { segments = null, poles = null, blades = null, teeth = null } = geometry ?? {};
  if (segments !== null && eventsPerTurn === leastCommonMultiple(poles ?? USUAL_POLES, segments)) {
    return { noun: 'ripple', because: `: ${commutatorWords(segments, poles ?? USUAL_POLES)}` };
  }
  if (blades === eventsPerTurn) return { noun: 'blade', because: ', each passing once' };
  if (teeth === eventsPerTurn) return { noun: 'tooth contact', because: '' };
  return { noun: 'event', because: ', as given' };
}

function commutatorWords(segments: number, poles: number): string {
  const hasProduct = leastCommonMultiple(poles, segments) === poles * segments;
  return `${String(segments)} segments ${hasProduct ? '×' : 'under'} ${String(poles)} poles`;
}

/** What other counts would make of the same sound: "10 a turn: 1724 rpm". */
export function wrongCountTexts(reading: { rpm: number; eventsPerTurn: number }, geometry: Geometry | null): string[] {
  return otherCounts(reading.eventsPerTurn, geometry)
    .slice(0, MOST_WRONG_COUNTS)
    .map(
      (count) =>
        `${plainNumberText(count)} a turn: ${numberText((reading.rpm * reading.eventsPerTurn) / count, 0)} rpm`,
    );
}

function otherCounts(eventsPerTurn: number, geometry: Geometry | null): number[] {
  const counts =
    geometry?.segments == null
      ? [eventsPerTurn - 1, eventsPerTurn + 1]
      : USUAL_SEGMENTS.map((segments) => leastCommonMultiple(geometry.poles ?? USUAL_POLES, segments));
  const others = [...new Set(counts)].filter((count) => count >= 1 && count !== eventsPerTurn);
  return others.sort((a, b) => Math.abs(Math.log(a / eventsPerTurn)) - Math.abs(Math.log(b / eventsPerTurn)));
}
