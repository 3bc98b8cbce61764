import { teethOver, type Tooth } from '#components/charts/teeth.ts';
import { numberText } from '#lib/format/numberText.ts';

/** One reason that the spectrum gives, and the teeth that it speaks of. */
export interface ProofReason {
  readonly text: string;
  readonly teeth: readonly number[];
}

/** The rack over one spectrum, and what the ranking says about half its speed. */
interface Rack {
  /** Event rate in the unit of the positions. */
  readonly spacing: number;
  /** As people write it: "Hz", "orders". */
  readonly unit: string;
  readonly eventsPerTurn: number;
  readonly isHalfPossible: boolean;
}

/** The reasons speak of the first teeth: further up every motor fades. */
const FIRST_TEETH = 8;

/**
 * What a spectrum says for or against events at this spacing, as sentences.
 *
 * @param positions ascending, shape [rowCount]
 * @param levels dB above the floor, shape [rowCount]
 */
export function proofReasons(
  positions: readonly number[],
  levels: readonly (number | null)[],
  rack: Rack,
): ProofReason[] {
  const { spacing, unit } = rack;
  const teeth = teethOver(positions, levels, spacing).slice(0, FIRST_TEETH);
  if (teeth.length === 0) return [{ text: 'The first tooth lies beyond this spectrum.', teeth: [] }];
  const found = teeth.filter((tooth) => tooth.isFound);
  const missing = teeth.filter((tooth) => !tooth.isFound);
  const reasons: ProofReason[] = [
    {
      text: `${String(found.length)} of the first ${String(teeth.length)} teeth stand on a line.`,
      teeth: multiplesOf(found),
    },
  ];
  const strongest = strongestOf(found);
  if (strongest !== null) reasons.push(strongestReason(strongest, unit));
  if (found.length > 0 && missing.length > 0) {
    reasons.push({
      text: `No line at ${listText(multiplesOf(missing))}.`,
      teeth: multiplesOf(missing),
    });
  }
  return [...reasons, betweenReason(positions, levels, rack)];
}

function strongestReason(tooth: Tooth, unit: string): ProofReason {
  const level = numberText(tooth.levelDecibels ?? 0, 0);
  const place = unit === 'Hz' ? `${numberText(tooth.position, 1)} Hz` : `order ${numberText(tooth.position, 1)}`;
  return {
    text: `The strongest line under a tooth is at ${place}, ${level} dB above the floor.`,
    teeth: [tooth.multiple],
  };
}

/** Half the speed would need lines in the middle between the teeth; finding them does not yet speak for it. */
function betweenReason(positions: readonly number[], levels: readonly (number | null)[], rack: Rack): ProofReason {
  const between = teethOver(positions, levels, rack.spacing / 2)
    .slice(0, 2 * FIRST_TEETH)
    .filter(({ multiple }) => multiple % 2 === 1);
  const count = between.filter((tooth) => tooth.isFound).length;
  const places = `${String(count)} of ${String(between.length)} places`;
  const meaning = count * 2 > between.length ? meaningOfLinesBetween(rack) : '.';
  return {
    text: `Between the teeth, where half the speed would need lines, ${places} have one${meaning}`,
    teeth: [],
  };
}

function meaningOfLinesBetween({ eventsPerTurn, isHalfPossible }: Rack): string {
  if (isHalfPossible) return ': half stays possible.';
  // With an even count the middle between two teeth is a whole multiple of the turning rate.
  return eventsPerTurn % 2 === 0
    ? '. Events that differ within a turn put lines there too, and half explains the other lines less well.'
    : ', yet half explains the other lines less well.';
}

function strongestOf(teeth: readonly Tooth[]): Tooth | null {
  return teeth.reduce<Tooth | null>(
    (best, tooth) => ((tooth.levelDecibels ?? 0) > (best?.levelDecibels ?? -Infinity) ? tooth : best),
    null,
  );
}

function multiplesOf(teeth: readonly Tooth[]): number[] {
  return teeth.map(({ multiple }) => multiple);
}

function listText(multiples: readonly number[]): string {
  const [last, ...others] = [...multiples].reverse();
  const word = multiples.length === 1 ? 'tooth' : 'teeth';
  return others.length === 0 ? `${word} ${String(last)}` : `${word} ${others.reverse().join(', ')} and ${String(last)}`;
}
