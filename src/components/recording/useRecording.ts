import { useQuery } from '@tanstack/react-query';
import { recordingQuery } from '#client/queries/recordings.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';

/** The recording as it is now; what the server drew is the first answer. All islands of a page share one. */
export function useRecording(initial: RecordingView): RecordingView {
  const { data } = useQuery({ ...recordingQuery(initial.id), initialData: initial });
  return data;
}
