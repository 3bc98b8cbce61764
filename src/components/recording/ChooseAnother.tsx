import { useState, type SubmitEvent } from 'react';
import { Button } from '#components/ui/Button.tsx';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import { TextField } from '#components/ui/TextField.tsx';
import { numberText } from '#lib/format/numberText.ts';
import { parseNumber } from '#lib/format/parseNumber.ts';
import { reviewRequest, type ReviewRequest } from '#lib/schemas/reading.ts';
import type { RecordingView } from '#lib/schemas/recording.ts';
import { isSameSpeed } from './rivals.ts';
import { useShownSpeed } from './shownSpeed.ts';

interface Props {
  readonly recording: RecordingView;
  readonly isBusy: boolean;
  readonly onReview: (review: ReviewRequest) => void;
  readonly onCancel: () => void;
}

const OTHER = 'other';
const NOTHING = 'nothing';

/** What someone looked at before is what they are likely to choose. */
function choiceOf(shownRpm: number | null, candidates: readonly { rpm: number }[]): string {
  if (shownRpm === null) return '';
  const index = candidates.findIndex(({ rpm }) => isSameSpeed(rpm, shownRpm));
  return index < 0 ? OTHER : String(index);
}

/** Another speed than the machine's: a candidate, a typed one, or nothing at all, with the reason. */
export function ChooseAnother({ recording, isBusy, onReview, onCancel }: Props) {
  const shownRpm = useShownSpeed();
  const candidates = recording.reading?.candidates ?? [];
  const [choice, setChoice] = useState(() => choiceOf(shownRpm, candidates));
  const [typedRpm, setTypedRpm] = useState(shownRpm === null ? '' : numberText(shownRpm, 1));
  const [reason, setReason] = useState('');
  const [error, setError] = useState<string>();
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    const rpm = choice === OTHER ? parseNumber(typedRpm) : candidates[Number(choice)]?.rpm;
    const parsed = reviewRequest.safeParse(
      choice === NOTHING ? { decision: 'nothing-turning', reason } : { decision: 'choose', rpm, reason },
    );
    if (choice === '') setError('Choose one of these.');
    else if (!parsed.success) setError(parsed.error.issues[0]?.message ?? 'Give a speed above 0 rpm.');
    else onReview(parsed.data);
  };
  const radio = (value: string) => ({
    type: 'radio',
    name: 'another-speed',
    value,
    checked: choice === value,
    onChange: () => {
      setChoice(value);
      setError(undefined);
    },
    className: 'size-5 accent-ink',
  });
  return (
    <form onSubmit={submit} noValidate className="grid max-w-96 gap-4 border-l-[3px] border-ink pl-4">
      <fieldset>
        <legend className="font-bold">Which speed is it?</legend>
        {candidates.map(({ rpm }, index) => (
          <label key={rpm} className="flex items-center gap-3 touch">
            <input {...radio(String(index))} />
            <span className="figures">
              <GroupedText text={numberText(rpm, 0)} />
            </span>
            rpm
          </label>
        ))}
        <label className="flex items-center gap-3 touch">
          <input {...radio(OTHER)} /> Another speed
        </label>
        {choice === OTHER && (
          <TextField
            label="Shaft speed"
            unit="rpm"
            inputMode="decimal"
            value={typedRpm}
            onChange={(event) => {
              setTypedRpm(event.target.value);
            }}
          />
        )}
        <label className="flex items-center gap-3 touch">
          <input {...radio(NOTHING)} /> Nothing was turning
        </label>
      </fieldset>
      <TextField
        label="Reason"
        hint="What you know that the sound does not say"
        value={reason}
        onChange={(event) => {
          setReason(event.target.value);
        }}
        error={error}
      />
      <div className="flex gap-3">
        <Button type="submit" weight="main" isBusy={isBusy}>
          Choose this
        </Button>
        <Button onClick={onCancel}>Back</Button>
      </div>
    </form>
  );
}
