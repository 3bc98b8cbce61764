const NAMES = ['ground', 'sheet', 'line', 'control', 'ink', 'muted', 'copper'] as const;

/** The tokens as a canvas takes them: resolved CSS colours of the theme that holds at the element. */
export type ChartColours = Readonly<Record<(typeof NAMES)[number], string>>;

/** Resolves the colour tokens where they stand, so that theme and print are followed. */
export function chartColours(element: HTMLElement): ChartColours {
  const probe = document.createElement('span');
  element.append(probe);
  const resolve = (name: string) => {
    probe.style.color = `var(--color-${name})`;
    return getComputedStyle(probe).color;
  };
  const colours = Object.fromEntries(NAMES.map((name) => [name, resolve(name)])) as Record<
    (typeof NAMES)[number],
    string
  >;
  probe.remove();
  return colours;
}

const PARTS = /[\d.]+/gu;

/** Red, green and blue of a resolved colour, each in [0, 255]. */
export function rgbOf(colour: string): [number, number, number] {
  const [red = 0, green = 0, blue = 0] = (colour.match(PARTS) ?? []).map(Number);
  return [red, green, blue];
}

/** A resolved colour with an opacity in [0, 1]. */
export function withOpacity(colour: string, opacity: number): string {
  return `rgb(${rgbOf(colour).join(' ')} / ${String(opacity)})`;
}
