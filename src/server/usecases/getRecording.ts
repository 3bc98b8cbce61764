import type { Actor } from '../policies/actor.ts';
import { loadReadableRecording, type RecordingDetails, withDetails } from './recordingDetails.ts';

/** @throws ServerError not-found */
export async function getRecording(wanted: { actor: Actor; recordingId: string }): Promise<RecordingDetails> {
  const recording = await loadReadableRecording(wanted.actor, wanted.recordingId);
  const [details] = await withDetails([recording]);
  return details ?? { recording, review: null, seriesNames: [] };
}
