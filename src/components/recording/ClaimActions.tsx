import { useState } from 'react';
import { ApiError } from '#client/api/ApiError.ts';
import { Button } from '#components/ui/Button.tsx';
import { ButtonLink } from '#components/ui/ButtonLink.tsx';
import { Notice } from '#components/ui/Notice.tsx';
import type { ReviewRequest } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { ChooseAnother } from './ChooseAnother.tsx';
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
          {review?.decision !== 'confirm' && (
            <Button
              weight="main"
              isBusy={isPending}
              className="max-desk:hidden"
              onClick={() => {
                say(confirmationOf(recording));
              }}
            >
              Confirm
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
      {(review?.decision === 'record-again' || recording.status === 'failed') && (
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

/** Confirming says what the machine said: its speed, or that nothing turned. */
export function confirmationOf({ reading }: RecordingView): ReviewRequest {
  return { decision: reading?.status === 'no-rotation' ? 'nothing-turning' : 'confirm', reason: '' };
}
