import { Button } from '#components/ui/Button.tsx';
import { numberText } from '#lib/format/numberText.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import type { useListening } from './useListening.ts';

interface Props {
  readonly recording: RecordingView;
  readonly listening: ReturnType<typeof useListening>;
}

/** The sound itself: from the start here, from any moment by the trend above. */
export function Listening({ recording, listening }: Props) {
  const durationSeconds = recording.reading?.durationSeconds ?? recording.media.durationSeconds;
  const { audioProps, isPlaying, atSeconds, hasFailed, hearFrom, stop } = listening;
  return (
    <div className="flex flex-wrap items-center gap-3 py-2 print:hidden">
      {/* The sound of a motor has no words that captions could carry. */}
      {/* eslint-disable-next-line jsx-a11y/media-has-caption */}
      <audio {...audioProps} preload="none" src={`/api/v1/recordings/${recording.id}/playback`} />
      {isPlaying ? (
        <Button onClick={stop}>Stop</Button>
      ) : (
        <Button
          onClick={() => {
            hearFrom(0);
          }}
        >
          Hear it from the start
        </Button>
      )}
      <p className="text-small text-muted" aria-live="off">
        {isPlaying &&
          `at ${numberText(atSeconds, 1)}${durationSeconds === null ? '' : ` of ${numberText(durationSeconds, 1)}`} s`}
        {hasFailed && 'The sound could not be played; the original can be downloaded below.'}
      </p>
    </div>
  );
}
