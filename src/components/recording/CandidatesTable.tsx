import { GroupedText } from '#components/ui/GroupedText.tsx';
import { numberText } from '#lib/format/numberText.ts';
import type { ReadingView } from '#lib/schemas/reading.ts';
import { isSameSpeed, relationOf } from './rivals.ts';

interface Props {
  /** Best first. */
  readonly candidates: ReadingView['candidates'];
  /** The speed that the evidence is held against. */
  readonly chosenRpm: number | null;
  readonly answerRpm: number | null;
  readonly onLook: (rpm: number) => void;
}

/** The candidates as a list of choices: the speed line for the keyboard, and for those who want the reasons. */
export function CandidatesTable({ candidates, chosenRpm, answerRpm, onLook }: Props) {
  return (
    <fieldset className="mt-4">
      <legend className="text-small text-muted">Hold the evidence below against another speed</legend>
      <ul>
        {candidates.map(({ rpm, score, reason }) => {
          const isChosen = chosenRpm !== null && isSameSpeed(rpm, chosenRpm);
          const relation = answerRpm === null ? null : relationOf(rpm, answerRpm);
          return (
            <li
              key={rpm}
              className={`border-t border-line ${isChosen ? 'border-l-[3px] border-l-ink pl-3' : 'pl-[15px]'}`}
            >
              <label className="grid cursor-pointer grid-cols-[1.5rem_6.5rem_minmax(0,1fr)] items-center gap-x-2 py-1 touch desk:grid-cols-[1.5rem_7rem_5rem_6rem_minmax(0,1fr)]">
                <input
                  type="radio"
                  name="shown-speed"
                  className="size-5 accent-ink"
                  checked={isChosen}
                  onChange={() => {
                    onLook(rpm);
                  }}
                />
                <span className="text-end figures">
                  <GroupedText text={numberText(rpm, 0)} /> <span className="font-sans text-small text-muted">rpm</span>
                </span>
                <span className="text-small">
                  {relation === null ? '' : relation === 'chosen' ? 'the reading' : relation}
                </span>
                <span className="text-small text-muted max-desk:col-start-2">weight {numberText(score, 2)}</span>
                <span className="text-small max-desk:col-span-2 max-desk:col-start-2">
                  <GroupedText text={reason} />
                </span>
              </label>
            </li>
          );
        })}
      </ul>
    </fieldset>
  );
}
