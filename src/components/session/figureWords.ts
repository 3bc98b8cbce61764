import type { SessionPurpose, SessionResultView } from '#lib/schemas/session.ts';

export type SessionFigure = SessionResultView['figures'][string];

/** Names of the figures that a session's result may carry. */
const FIGURE_NAMES: Readonly<Record<string, string>> = {
  meanSpeed: 'Mean speed',
  speedSpread: 'Spread from recording to recording',
  repeatability: 'Repeatability',
  speedConstant: 'Speed constant',
  noLoadOffset: 'Voltage lost before it turns',
};

/** The figure that a session is about, in order of preference. */
const MAIN_FIGURES: Record<SessionPurpose, readonly string[]> = {
  'speed-check': ['meanSpeed'],
  'voltage-sweep': ['speedConstant', 'meanSpeed'],
  'coast-down': ['meanSpeed'],
  'run-time': ['meanSpeed'],
  load: ['meanSpeed'],
  batch: ['meanSpeed'],
  class: ['meanSpeed'],
};

/** A figure's name for people; one that this page does not know yet is spelt out from its key. */
export function figureName(key: string): string {
  const known = FIGURE_NAMES[key];
  if (known !== undefined) return known;
  const words = key.replaceAll(/[A-Z]/gu, (letter) => ` ${letter.toLowerCase()}`);
  return words.charAt(0).toUpperCase() + words.slice(1);
}

/** Key and value of the figure that stands largest; null when nothing was computed. */
export function mainFigure({ purpose, figures }: SessionResultView): [string, SessionFigure] | null {
  const key = MAIN_FIGURES[purpose].find((name) => name in figures) ?? Object.keys(figures)[0];
  const figure = key === undefined ? undefined : figures[key];
  return key === undefined || figure === undefined ? null : [key, figure];
}
