/** How much a button asks to be pressed: `main` once a view, `plain` otherwise, `word` inside text and rows. */
export type ButtonWeight = 'main' | 'plain' | 'word';

const SHAPES: Record<ButtonWeight, string> = {
  main: 'rounded-edge border-2 border-ink bg-sheet px-4 font-bold',
  plain: 'rounded-edge border border-control bg-sheet px-4 hover:border-ink',
  word: 'underline underline-offset-4 hover:decoration-2',
};

/** Classes of a button; the same for a link that looks like one. Ink on sheet, never copper; nothing to press on paper. */
export function buttonClasses(weight: ButtonWeight, extra = ''): string {
  return `touch inline-flex items-center justify-center gap-2 py-2 text-ink no-underline disabled:opacity-60 print:hidden ${SHAPES[weight]} ${extra}`;
}
