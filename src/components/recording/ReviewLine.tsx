import { LocalTime } from '#components/session/LocalTime.tsx';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import { StateMark } from '#components/ui/StateMark.tsx';
import { numberText } from '#lib/format/numberText.ts';
import type { ReviewView } from '#lib/schemas/reading.ts';

const DECISION_WORDS = {
  confirm: 'Confirmed',
  choose: 'Chosen',
  'nothing-turning': 'Nothing turning',
  'record-again': 'To be recorded again',
} as const;

/** What a person said about the reading. */
export function ReviewLine({ review }: { readonly review: ReviewView }) {
  const { decision, rpm, reason, reviewer, createdAt } = review;
  return (
    <div className="max-w-sentence">
      <StateMark shape={decision === 'record-again' ? 'flagged' : 'within'}>
        {DECISION_WORDS[decision]}
        {rpm !== null && <GroupedText text={`: ${numberText(rpm, 0)} rpm`} />}
      </StateMark>
      <p className="text-small text-muted">
        {reviewer.name}, <LocalTime moment={createdAt} />
        {reason !== '' && `: ${reason}`}
      </p>
    </div>
  );
}
