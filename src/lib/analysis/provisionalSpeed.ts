import { averageSpectrum } from "#lib/signal/averageSpectrum.ts";
import type { FrontEnd, SampledSignal } from "#lib/signal/frontEnd.ts";
import { subtractNoiseFloor } from "#lib/signal/noiseFloor.ts";
import { eventHertzFromRpm, rpmFromEventHertz } from "#lib/units/rotation.ts";
import type { AnalysisSettings } from "./settings.ts";

export interface ScoredSpeed {
  readonly shaftSpeedRpm: number;
  readonly score: number;
}

interface Levels {
  readonly levels: Float32Array;
  readonly binHz: number;
  readonly highestHz: number;
}

const WEIGHTS = [1, 0.95, 0.85, 0.75, 0.65, 0.55, 0.5, 0.45];

export function scoreSpeeds(
  frontEnd: FrontEnd,
  settings: AnalysisSettings,
): ScoredSpeed[] {
  const waveform = levelsOf([frontEnd.waveform], 32768);
  const envelope = levelsOf(frontEnd.envelopes, 16384);
  const low = eventHertzFromRpm(settings.minimumRpm, settings.eventsPerTurn);
  const high = Math.min(
    eventHertzFromRpm(settings.maximumRpm, settings.eventsPerTurn),
    waveform.highestHz,
  );
  const scored: ScoredSpeed[] = [];
  for (let eventHz = low; eventHz <= high; eventHz *= 1.0005) {
    const shaftHz = eventHz / settings.eventsPerTurn;
    let score = 2 * comb(waveform, eventHz) + 2.4 * comb(envelope, eventHz);
    if (settings.eventsPerTurn > 1)
      score +=
        0.55 * (1.5 * comb(waveform, shaftHz) + 2.4 * comb(envelope, shaftHz));
    scored.push({
      shaftSpeedRpm: rpmFromEventHertz(eventHz, settings.eventsPerTurn),
      score,
    });
  }
  const peaks = scored.filter((entry, index) => {
    const neighbours = scored.slice(Math.max(0, index - 12), index + 13);
    return neighbours.every((other) => other.score <= entry.score);
  });
  return peaks.sort((a, b) => b.score - a.score).slice(0, 8);
}

function comb(source: Levels, fundamentalHz: number): number {
  let sum = 0;
  let weight = 1.2;
  for (const [index, factor] of WEIGHTS.entries()) {
    const hz = fundamentalHz * (index + 1);
    if (hz > source.highestHz) break;
    sum +=
      factor *
      (levelAt(source, hz) - 0.45 * levelAt(source, hz - fundamentalHz / 2));
    weight += factor;
  }
  return sum / weight;
}

function levelAt({ levels, binHz }: Levels, hz: number): number {
  const bin = Math.round(hz / binHz);
  const level = Math.max(
    levels[bin - 1] ?? 0,
    levels[bin] ?? 0,
    levels[bin + 1] ?? 0,
  );
  return Math.max(0, Math.min(6, level - 1.6));
}

function levelsOf(signals: readonly SampledSignal[], size: number): Levels {
  const strongest = new Float32Array(size / 2 + 1).fill(-100);
  let rate = 1;
  for (const { samples, sampleRateHz } of signals) {
    rate = sampleRateHz;
    const { power } = averageSpectrum(samples, sampleRateHz, size, 8);
    const levels = subtractNoiseFloor(
      Float32Array.from(power, (value) => Math.log(value + Number.MIN_VALUE)),
      60,
    );
    for (let bin = 0; bin < levels.length; bin++)
      strongest[bin] = Math.max(strongest[bin] ?? 0, levels[bin] ?? 0);
  }
  return { levels: strongest, binHz: rate / size, highestHz: 0.43 * rate };
}
