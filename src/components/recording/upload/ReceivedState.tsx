import { useQuery } from '@tanstack/react-query';
import { recordingQuery } from '#client/queries/recordings.ts';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import { StateMark } from '#components/ui/StateMark.tsx';
import { standingOf } from '#components/recording/recordingStanding.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';

interface Props {
  readonly recordingId: string;
  readonly duplicateOf: string | null;
}

/** Asked as often as this while the reading is awaited, should the updates stream be away. */
const ASK_AGAIN_MILLISECONDS = 4000;

/** What became of a file that the server has: waiting, being analysed, its speed. */
export function ReceivedState({ recordingId, duplicateOf }: Props) {
  const { data: recording } = useQuery({
    ...recordingQuery(recordingId),
    refetchInterval: (query) => (isAwaited(query.state.data) ? ASK_AGAIN_MILLISECONDS : false),
  });
  return (
    <div aria-live="polite">
      {recording === undefined ? (
        <StateMark shape="waiting">Safe here; waiting for its analysis</StateMark>
      ) : (
        <Standing recording={recording} />
      )}
      {duplicateOf !== null && (
        <p className="text-small">
          The very same file is <a href={`/recordings/${duplicateOf}`}>already here</a>; both are kept.
        </p>
      )}
    </div>
  );
}

function Standing({ recording }: { recording: RecordingView }) {
  const { shape, sentence } = standingOf(recording);
  const link = (
    <a href={`/recordings/${recording.id}`} className="inline-flex items-center touch">
      <span>
        <GroupedText text={sentence} />
      </span>
    </a>
  );
  return shape === null ? link : <StateMark shape={shape}>{link}</StateMark>;
}

function isAwaited(recording: RecordingView | undefined): boolean {
  return recording === undefined || recording.status === 'queued' || recording.status === 'working';
}
