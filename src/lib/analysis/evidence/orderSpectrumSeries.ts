import type { OrderLevels, OrderSpectra } from '#lib/signal/orderLevels.ts';
import { decibelsFromLogPower } from '#lib/units/decibels.ts';
import type { Series } from '../series.ts';
import { decimateSpectrum } from './decimateSpectrum.ts';

/** Highest order drawn, in multiples of the events per turn, and at least. */
const MOST_EVENT_ORDERS = 8;
const LEAST_HIGHEST_ORDER = 32;
/** Orders below this show only the swelling of the sound. */
const LOWEST_ORDER_FRACTION = 0.1;

/**
 * Level of lines over shaft order: at each order that of the waveform or of the envelope, whichever stands out more.
 *
 * @param options tracked cycles per turn of the shaft, and events per turn
 */
export function orderSpectrumSeries(
  spectra: OrderSpectra,
  options: { readonly cyclesPerTurn: number; readonly eventsPerTurn: number },
): Series {
  const { waveform, envelope } = spectra;
  const highestOrder = Math.max(LEAST_HIGHEST_ORDER, MOST_EVENT_ORDERS * options.eventsPerTurn);
  const levels = waveform.levels.map((level, bin) => {
    const order = bin * waveform.ordersPerBin;
    const own = order >= waveform.lowestOrder && order <= waveform.highestOrder ? level : Number.NEGATIVE_INFINITY;
    const loudness = levelAt(envelope, order);
    const highest = Math.max(own, loudness);
    return decibelsFromLogPower(Number.isFinite(highest) ? highest : 0);
  });
  const step = waveform.ordersPerBin * options.cyclesPerTurn;
  const lowest = LOWEST_ORDER_FRACTION * Math.min(1, options.eventsPerTurn);
  const highest = Math.min(
    highestOrder,
    Math.max(waveform.highestOrder, envelope.highestOrder) * options.cyclesPerTurn,
  );
  const rows = decimateSpectrum(levels, {
    step,
    firstBin: Math.ceil(lowest / step),
    endBin: Math.floor(highest / step),
  });
  return {
    name: 'orderSpectrum',
    columns: [
      { name: 'order', unit: '1', values: rows.positions },
      { name: 'levelDecibels', unit: 'dB', values: rows.levels },
    ],
  };
}

/** Highest level within half a waveform bin of an order, for spectra whose bins differ. */
function levelAt(spectrum: OrderLevels, order: number): number {
  if (order < spectrum.lowestOrder || order > spectrum.highestOrder) return Number.NEGATIVE_INFINITY;
  return spectrum.levels[Math.round(order / spectrum.ordersPerBin)] ?? Number.NEGATIVE_INFINITY;
}
