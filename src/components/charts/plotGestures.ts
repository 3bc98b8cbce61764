import { movedRange, zoomedRange, type PlotRange } from './plotRange.ts';

interface Gestures {
  readonly hasFocus: () => boolean;
  readonly range: () => PlotRange;
  readonly whole: () => PlotRange;
  /** The place of a horizontal client coordinate on the axis. */
  readonly positionAt: (clientX: number) => number;
  readonly onRange: (range: PlotRange) => void;
  /** A finger rests or moves on the plot. */
  readonly onPoint: (clientX: number, clientY: number) => void;
}

const WHEEL_STEP = 1.2;

/**
 * Pinch and wheel zoom about the fingers or the pointer; one finger reads values. The wheel zooms only once the chart
 * has the focus (or with Ctrl, which is how a touchpad pinches): a page that scrolls must not be caught by a chart.
 *
 * @returns takes the listeners off again
 */
export function listenToGestures(plot: HTMLElement, gestures: Gestures): () => void {
  const stop = new AbortController();
  const options = { signal: stop.signal };
  plot.style.touchAction = 'pan-y';
  plot.addEventListener(
    'wheel',
    (event) => {
      if (!gestures.hasFocus() && !event.ctrlKey) return;
      event.preventDefault();
      const factor = event.deltaY > 0 ? WHEEL_STEP : 1 / WHEEL_STEP;
      const about = gestures.positionAt(event.clientX);
      gestures.onRange(zoomedRange(gestures.range(), gestures.whole(), factor, about));
    },
    { ...options, passive: false },
  );
  listenToFingers(plot, gestures, options);
  return () => {
    stop.abort();
  };
}

function listenToFingers(plot: HTMLElement, gestures: Gestures, options: { signal: AbortSignal }) {
  const fingers = new Map<number, number>();
  const release = (event: PointerEvent) => fingers.delete(event.pointerId);
  plot.addEventListener(
    'pointerdown',
    (event) => {
      if (event.pointerType === 'mouse') return;
      fingers.set(event.pointerId, event.clientX);
      if (fingers.size === 1) gestures.onPoint(event.clientX, event.clientY);
    },
    options,
  );
  plot.addEventListener(
    'pointermove',
    (event) => {
      const before = fingers.get(event.pointerId);
      if (before === undefined) return;
      fingers.set(event.pointerId, event.clientX);
      const other = [...fingers].find(([id]) => id !== event.pointerId)?.[1];
      if (other === undefined) gestures.onPoint(event.clientX, event.clientY);
      else pinch(gestures, before, event.clientX, other);
    },
    options,
  );
  for (const type of ['pointerup', 'pointercancel'] as const) addEventListener(type, release, options);
}

/** Two fingers: their distance sets the scale, their middle drags the chart along. */
function pinch(gestures: Gestures, before: number, now: number, other: number) {
  const distance = Math.abs(now - other);
  if (distance < 1) return;
  const from = gestures.positionAt((before + other) / 2);
  const to = gestures.positionAt((now + other) / 2);
  const zoomed = zoomedRange(gestures.range(), gestures.whole(), Math.abs(before - other) / distance, from);
  gestures.onRange(movedRange(zoomed, gestures.whole(), from - to));
}
