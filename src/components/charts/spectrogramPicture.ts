import { median } from '#lib/statistics/quantiles.ts';
import { rgbOf, type ChartColours } from './chartColours.ts';

/** A spectrogram as columns. */
export interface SpectrogramColumns {
  /** Ascending, shape [timeCount]. */
  readonly timeSeconds: readonly number[];
  /** Ascending, shape [frequencyCount]. */
  readonly frequencyHz: readonly number[];
  /** dB over any reference, shape [timeCount, frequencyCount], row-major; null is a gap. */
  readonly levelDecibels: readonly (number | null)[];
}

/** Levels from here on are drawn in full ink: more contrast would hide the weak lines. */
const FULL_INK_DECIBELS = 36;
/** The picture stays faint, so that the line on it is what one sees. */
const STRONGEST_INK = 0.75;
const OPAQUE = 255;

/** The spectrogram as a picture, one pixel a cell, in one hue from sheet to ink and monotone in lightness. */
export function spectrogramPicture(columns: SpectrogramColumns, colours: ChartColours): HTMLCanvasElement {
  const timeCount = columns.timeSeconds.length;
  const frequencyCount = columns.frequencyHz.length;
  const canvas = document.createElement('canvas');
  canvas.width = Math.max(1, timeCount);
  canvas.height = Math.max(1, frequencyCount);
  const context = canvas.getContext('2d');
  if (context === null) return canvas;
  const image = context.createImageData(canvas.width, canvas.height);
  const floor = median(columns.levelDecibels.filter((level) => level !== null));
  const sheet = rgbOf(colours.sheet);
  const ink = rgbOf(colours.ink);
  for (let time = 0; time < timeCount; time += 1) {
    for (let bin = 0; bin < frequencyCount; bin += 1) {
      const share = inkShare((columns.levelDecibels[time * frequencyCount + bin] ?? floor) - floor);
      const pixel = ((frequencyCount - 1 - bin) * timeCount + time) * 4;
      for (const part of [0, 1, 2] as const) image.data[pixel + part] = sheet[part] + (ink[part] - sheet[part]) * share;
      image.data[pixel + 3] = OPAQUE;
    }
  }
  context.putImageData(image, 0, 0);
  return canvas;
}

/** Share of ink for a level above the floor, dB: 0 at the floor, rising evenly. */
export function inkShare(levelDecibels: number): number {
  return Math.min(1, Math.max(0, levelDecibels / FULL_INK_DECIBELS)) * STRONGEST_INK;
}
