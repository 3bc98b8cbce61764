import { cyclesAt, longestActiveStretch } from '#lib/signal/eventTrack.ts';
import type { FrontEnd } from '#lib/signal/frontEnd.ts';
import type { RefinedTrack } from '#lib/signal/refineTrack.ts';
import { resampleByPhase } from '#lib/signal/resampleByPhase.ts';
import type { Series } from '../series.ts';

/** Points of one turn. */
const POINTS_PER_TURN = 256;
/** Turns averaged at most: more only smear what the track leaves of the wander. */
const MOST_TURNS = 400;

/**
 * Loudness over one turn of the shaft, averaged over many turns: contacts, blades or teeth stand at their angles.
 * Where a turn begins is not known; the loudest point is put a quarter turn from the start.
 *
 * @param cyclesPerTurn tracked cycles in one turn of the shaft
 * Reference: time synchronous averaging, S. Braun (1975), The extraction of periodic waveforms by time domain
 * averaging, Acustica 32.
 */
export function oneTurnAverageSeries(frontEnd: FrontEnd, refined: RefinedTrack, cyclesPerTurn: number): Series {
  const { startSeconds, endSeconds } = longestActiveStretch(refined.track);
  const firstCycle = cyclesAt(refined.phase, startSeconds);
  const turns = Math.max(
    1,
    Math.min(MOST_TURNS, Math.floor((cyclesAt(refined.phase, endSeconds) - firstCycle) / cyclesPerTurn)),
  );
  const average = new Float32Array(POINTS_PER_TURN);
  for (const envelope of frontEnd.envelopes) {
    const resampled = resampleByPhase(envelope, refined.phase, {
      firstCycle,
      cyclesPerSample: cyclesPerTurn / POINTS_PER_TURN,
      sampleCount: turns * POINTS_PER_TURN,
    });
    for (const [sample, value] of resampled.entries()) {
      const point = sample % POINTS_PER_TURN;
      // Envelopes are relative to their surroundings, less one.
      average[point] = (average[point] as number) + (value + 1) / turns / frontEnd.envelopes.length;
    }
  }
  return {
    name: 'oneTurnAverage',
    columns: [
      { name: 'turnFraction', unit: '1', values: average.map((_, point) => point / POINTS_PER_TURN) },
      { name: 'level', unit: '1', values: scaledToMeanOne(turnedToQuarter(average)) },
    ],
  };
}

function turnedToQuarter(average: Float32Array): Float32Array {
  let loudest = 0;
  for (let point = 1; point < average.length; point++) {
    if ((average[point] as number) > (average[loudest] as number)) loudest = point;
  }
  const shift = loudest - average.length / 4 + average.length;
  return average.map((_, point) => average[(point + shift) % average.length] as number);
}

function scaledToMeanOne(average: Float32Array): Float32Array {
  const mean = average.reduce((sum, value) => sum + value, 0) / average.length;
  return mean > 0 ? average.map((value) => value / mean) : average;
}
