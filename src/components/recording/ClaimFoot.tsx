import type { ReactNode } from 'react';
import { ClientProvider } from '#client/ClientProvider.tsx';
import { Button } from '#components/ui/Button.tsx';
import { buttonClasses } from '#components/ui/buttonStyle.ts';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { confirmationOf, confirmWords } from './confirmation.ts';
import { recordAgainHref, useReview } from './useReview.ts';
import { useRecording } from './useRecording.ts';

interface Props {
  readonly recording: RecordingView;
  /** The foot of other pages, for a recording that asks for nothing. */
  readonly children?: ReactNode;
}

/** The phone's foot on a recording that waits for a word: confirm, or record again. */
export function ClaimFoot({ recording, children }: Props) {
  return (
    <ClientProvider>
      <LiveFoot initial={recording} otherwise={children} />
    </ClientProvider>
  );
}

function LiveFoot({ initial, otherwise }: { initial: RecordingView; otherwise: ReactNode }) {
  const recording = useRecording(initial);
  const { mutate, isPending } = useReview(recording);
  const asksForWord = recording.reading !== null && recording.review === null && recording.abilities.canReview;
  if (!asksForWord) return otherwise;
  return (
    <div role="region" aria-label="Your word" className="grid grid-cols-2 gap-2 p-2">
      <Button
        weight="main"
        className="min-h-14"
        isBusy={isPending}
        onClick={() => {
          mutate(confirmationOf(recording));
        }}
      >
        <GroupedText text={confirmWords(recording)} />
      </Button>
      <a
        className={buttonClasses('plain', 'min-h-14')}
        href={recordAgainHref(recording)}
        onClick={() => {
          mutate({ decision: 'record-again', reason: '' });
        }}
      >
        Record again
      </a>
    </div>
  );
}
