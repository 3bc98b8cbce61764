import { teethOver, type Tooth } from '#components/charts/teeth.ts';
import { numberText } from '#lib/format/numberText.ts';

/** One reason that the spectrum gives, and the teeth that it speaks of. */
export interface ProofReason {
  readonly text: string;
  readonly teeth: readonly number[];
}

/** The reasons speak of the first teeth: further up every motor fades. */
const FIRST_TEETH = 8;

/**
 * What a spectrum says for or against events at this spacing, as sentences.
 *
 * @param positions ascending, shape [rowCount]
 * @param levels dB above the floor, shape [rowCount]
 * @param spacing event rate in the unit of `positions`
 * @param unit as people write it: "Hz", "orders"
 */
export function proofReasons(
  positions: readonly number[],
  levels: readonly (number | null)[],
  { spacing, unit }: { spacing: number; unit: string },
): ProofReason[] {
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
    reasons.push({ text: `No line at ${listText(multiplesOf(missing))}.`, teeth: multiplesOf(missing) });
  }
  return [...reasons, betweenReason(positions, levels, spacing)];
}

function strongestReason(tooth: Tooth, unit: string): ProofReason {
  const level = numberText(tooth.levelDecibels ?? 0, 0);
  const place = unit === 'Hz' ? `${numberText(tooth.position, 1)} Hz` : `order ${numberText(tooth.position, 1)}`;
  return {
    text: `The strongest line under a tooth is at ${place}, ${level} dB above the floor.`,
    teeth: [tooth.multiple],
  };
}

/** Half the speed would need lines in the middle between the teeth. */
function betweenReason(positions: readonly number[], levels: readonly (number | null)[], spacing: number): ProofReason {
  const between = teethOver(positions, levels, spacing / 2)
    .slice(0, 2 * FIRST_TEETH)
    .filter(({ multiple }) => multiple % 2 === 1);
  const count = between.filter((tooth) => tooth.isFound).length;
  const places = `${String(count)} of ${String(between.length)} places`;
  return {
    text:
      count * 2 > between.length
        ? `Between the teeth, where half the speed would need lines, ${places} have one: half stays possible.`
        : `Between the teeth, where half the speed would need lines, ${places} have one.`,
    teeth: [],
  };
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
