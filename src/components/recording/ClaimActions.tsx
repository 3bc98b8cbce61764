import { useState } from 'react';
import { ApiError } from '#client/api/ApiError.ts';
import { Button } from '#components/ui/Button.tsx';
import { ButtonLink } from '#components/ui/ButtonLink.tsx';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import { Notice } from '#components/ui/Notice.tsx';
import type { ReviewRequest } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { ChooseAnother } from './ChooseAnother.tsx';
import { confirmationOf, confirmWords } from './confirmation.ts';
import { ReviewLine } from './ReviewLine.tsx';
import { recordAgainHref, useReview } from './useReview.ts';

interface Props {
  readonly recording: RecordingView;
}

/** What a person can say to the claim: confirm it, choose another speed, or ask for another recording. */
export function ClaimActions({ recording }: Props) {
  const [isChoosing, setIsChoosing] = useState(false);
  const { mutate, isPending, error } = useReview(recording);
  const { reading, review, abilities } = recording;
  const canReview = abilities.canReview && reading !== null;
  const say = (request: ReviewRequest) => {
    mutate(request, {
      onSuccess: () => {
        setIsChoosing(false);
      },
    });
  };
  return (
    <div className="flex flex-col items-start gap-2">
      {review !== null && <ReviewLine review={review} />}
      {canReview && !isChoosing && (
        <>
          {review?.decision !== confirmationOf(recording).decision && (
            <Button
              weight="main"
              isBusy={isPending}
              className="max-desk:hidden"
              onClick={() => {
                say(confirmationOf(recording));
              }}
            >
              <GroupedText text={confirmWords(recording)} />
            </Button>
          )}
          <Button
            weight="word"
            onClick={() => {
              setIsChoosing(true);
            }}
          >
            Choose another
          </Button>
          {review?.decision !== 'record-again' && (
            <Button
              weight="word"
              className="max-desk:hidden"
              isBusy={isPending}
              onClick={() => {
                say({ decision: 'record-again', reason: '' });
              }}
            >
              Record again
            </Button>
          )}
        </>
      )}
      {canReview && isChoosing && (
        <ChooseAnother
          recording={recording}
          isBusy={isPending}
          onReview={say}
          onCancel={() => {
            setIsChoosing(false);
          }}
        />
      )}
      {(abilities.canEdit || abilities.canReview) &&
        (review?.decision === 'record-again' || recording.status === 'failed') && (
          <ButtonLink href={recordAgainHref(recording)}>
            {recording.status === 'failed' ? 'Record again' : 'Add the new recording'}
          </ButtonLink>
        )}
      {error !== null && (
        <Notice shape="outside" title="Not saved">
          {error instanceof ApiError ? error.detail : 'Try again in a moment.'}
        </Notice>
      )}
    </div>
  );
}
