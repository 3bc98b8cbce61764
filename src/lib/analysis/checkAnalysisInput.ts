import type { AnalysisInput } from './analyseRecording.ts';

/** Refuses what no caller may pass. @throws {RangeError} naming the parameter, its rule and its value */
export function checkAnalysisInput({ channels, sampleRateHz, settings }: AnalysisInput): void {
  const [first] = channels;
  if (!first) throw new RangeError('analyseRecording: channels must hold at least one channel');
  if (channels.some((channel) => channel.length !== first.length)) {
    throw new RangeError('analyseRecording: channels must be equally long');
  }
  if (!(sampleRateHz > 0)) throw new RangeError(`analyseRecording: sampleRateHz must be > 0, got ${sampleRateHz}`);
  if (!(settings.eventsPerTurn > 0)) {
    throw new RangeError(`analyseRecording: eventsPerTurn must be > 0, got ${settings.eventsPerTurn}`);
  }
  if (!(settings.minimumRpm > 0 && settings.maximumRpm > settings.minimumRpm)) {
    throw new RangeError(
      `analyseRecording: 0 < minimumRpm < maximumRpm must hold, got ${settings.minimumRpm} and ${settings.maximumRpm}`,
    );
  }
}
