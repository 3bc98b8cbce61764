import { scoreCombs } from '#lib/signal/combScore.ts';
import type { FrontEnd, SampledSignal } from '#lib/signal/frontEnd.ts';
import { createFrontEnd } from '#lib/signal/frontEnd.ts';
import { createLineMaps } from '#lib/signal/lineMaps.ts';
import { detectMainsHum, weakenMainsHum } from '#lib/signal/mainsHum.ts';
import type { MainsHum } from '#lib/signal/mainsHum.ts';
import { eventHertzFromRpm } from '#lib/units/rotation.ts';
import { rankHypotheses } from './rankHypotheses.ts';
import type { RankedHypothesis } from './rankHypotheses.ts';
import type { AnalysisSettings } from './settings.ts';
import { findSoundFamily } from './soundFamily.ts';

/** Everything that was found out about what may turn. */
export interface ShaftSearch {
  readonly frontEnd: FrontEnd;
  readonly hum: MainsHum | null;
  /** Speeds that the sound could mean, most probable first; empty when no rate in the range was found at all. */
  readonly ranked: readonly RankedHypothesis[];
}

/** A winner this probable needs no second family to compete with. */
const SURE_PROBABILITY = 0.97;
/** Highest event rate as a fraction of the sample rate. */
const HIGHEST_EVENT_FRACTION = 0.46;

/**
 * Searches a recording for a shaft within the allowed range of speeds.
 *
 * @param recording mono, offset removed
 */
export function findShaft(recording: SampledSignal, settings: AnalysisSettings): ShaftSearch {
  const frontEnd = createFrontEnd(recording.samples, recording.sampleRateHz);
  const lowestEventHz = eventHertzFromRpm(settings.minimumRpm, settings.eventsPerTurn);
  const highestEventHz = Math.min(
    eventHertzFromRpm(settings.maximumRpm, settings.eventsPerTurn),
    HIGHEST_EVENT_FRACTION * recording.sampleRateHz,
  );
  const hum = detectMainsHum(frontEnd.waveform);
  if (highestEventHz <= lowestEventHz) return { frontEnd, hum, ranked: [] };
  const maps = createLineMaps(frontEnd, recording, {
    lowestEventHz,
    highestEventHz,
  });
  if (hum) weakenMainsHum(maps.waveform, hum);
  const combs = scoreCombs(maps, {
    lowestEventHz,
    highestEventHz,
    eventsPerTurn: settings.eventsPerTurn,
  });
  const first = findSoundFamily(combs, frontEnd, null);
  if (!first) return { frontEnd, hum, ranked: [] };
  const ranked = rankHypotheses([first], combs, settings);
  if ((ranked[0]?.probability ?? 0) >= SURE_PROBABILITY) return { frontEnd, hum, ranked };
  const second = findSoundFamily(combs, frontEnd, {
    family: first,
    eventsPerTurn: settings.eventsPerTurn,
  });
  return {
    frontEnd,
    hum,
    ranked: second ? rankHypotheses([first, second], combs, settings) : ranked,
  };
}
