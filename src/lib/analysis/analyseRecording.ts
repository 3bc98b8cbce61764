import { createFrontEnd } from "#lib/signal/frontEnd.ts";
import { eventHertzFromRpm } from "#lib/units/rotation.ts";
import { fractionFromPpm } from "#lib/units/ratios.ts";
import { chooseChannel } from "./chooseChannel.ts";
import { ENGINE_VERSION } from "./engineVersion.ts";
import {
  envelopeSpectrumSeries,
  spectrumSeries,
} from "./evidence/spectrumSeries.ts";
import { waveformSeries } from "./evidence/waveformSeries.ts";
import { SILENCE_RMS } from "./inputChecks.ts";
import { scoreSpeeds } from "./provisionalSpeed.ts";
import type { NoRotationReason, Reading, ReadingWarning } from "./reading.ts";
import type { Series } from "./series.ts";
import type { AnalysisSettings } from "./settings.ts";

export interface AnalysisInput {
  /** One array per channel, all of shape [sampleCount], full scale ±1. */
  readonly channels: readonly Float32Array[];
  readonly sampleRateHz: number;
  readonly settings: AnalysisSettings;
  /** What was found while decoding; repeated in the reading. */
  readonly warnings?: readonly ReadingWarning[];
}

export interface Analysis {
  readonly reading: Reading;
  readonly series: readonly Series[];
}

const SHORTEST_SECONDS = 0.3;

export function analyseRecording(input: AnalysisInput): Analysis {
  const { settings, sampleRateHz } = input;
  const durationSeconds = (input.channels[0]?.length ?? 0) / sampleRateHz;
  const base = {
    engineVersion: ENGINE_VERSION,
    eventsPerTurn: settings.eventsPerTurn,
    durationSeconds,
    sampleRateHz,
  };
  const noRotation = (
    reason: NoRotationReason,
    warnings: readonly ReadingWarning[],
    series: readonly Series[],
  ): Analysis => ({
    reading: {
      ...base,
      status: "no-rotation",
      motion: "none",
      reason,
      candidates: [],
      warnings,
    },
    series,
  });
  const start = Math.round((settings.fromSeconds ?? 0) * sampleRateHz);
  const end =
    settings.toSeconds === null
      ? undefined
      : Math.round(settings.toSeconds * sampleRateHz);
  const channels = input.channels.map((channel) =>
    channel.subarray(start, end),
  );
  if ((channels[0]?.length ?? 0) < SHORTEST_SECONDS * sampleRateHz)
    return noRotation("too-short", input.warnings ?? [], []);
  const signal = chooseChannel(channels, settings.channel);
  const warnings = [
    ...new Set([...(input.warnings ?? []), ...signal.warnings]),
  ];
  const waveform = waveformSeries(signal.samples, sampleRateHz);
  if (signal.rms < SILENCE_RMS)
    return noRotation("silence", warnings, [waveform]);
  const clock = 1 - fractionFromPpm(settings.clockCorrectionPpm ?? 0);
  const frontEnd = createFrontEnd(signal.samples, sampleRateHz);
  const series = [
    waveform,
    spectrumSeries(frontEnd.waveform),
    envelopeSpectrumSeries(frontEnd.envelopes),
  ];
  const scored = scoreSpeeds(frontEnd, settings);
  const best = scored[0];
  if (!best || best.score < 2.5)
    return noRotation("nothing-periodic", warnings, series);
  const shaftSpeedRpm = best.shaftSpeedRpm * clock;
  const points = Math.max(1, Math.floor(durationSeconds * 10));
  const column = (value: (point: number) => number) =>
    Float32Array.from({ length: points }, (_, point) => value(point));
  const trend: Series = {
    name: "trend",
    columns: [
      {
        name: "timeSeconds",
        unit: "s",
        values: column((point) => (point + 0.5) / 10),
      },
      {
        name: "shaftSpeedRpm",
        unit: "rpm",
        values: column(() => shaftSpeedRpm),
      },
      {
        name: "lowRpm",
        unit: "rpm",
        values: column(() => shaftSpeedRpm * 0.998),
      },
      {
        name: "highRpm",
        unit: "rpm",
        values: column(() => shaftSpeedRpm * 1.002),
      },
    ],
  };
  return {
    reading: {
      ...base,
      status: "measured",
      motion: "steady",
      speed: {
        shaftSpeedRpm,
        lowRpm: shaftSpeedRpm * 0.998,
        highRpm: shaftSpeedRpm * 1.002,
      },
      confidence: Math.min(0.95, best.score / 10),
      eventHz: eventHertzFromRpm(shaftSpeedRpm, settings.eventsPerTurn),
      candidates: scored.map((entry) => ({
        shaftSpeedRpm: entry.shaftSpeedRpm * clock,
        score: Math.max(0, Math.min(1, entry.score / best.score)),
        reason: "Its events stand out of the spectrum.",
      })),
      warnings,
    },
    series: [...series, trend],
  };
}
