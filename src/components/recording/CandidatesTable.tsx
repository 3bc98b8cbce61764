import { Disclosure } from '#components/ui/Disclosure.tsx';
import { GroupedText } from '#components/ui/GroupedText.tsx';
import { numberText } from '#lib/format/numberText.ts';
import type { ReadingView } from '#lib/schemas/reading.ts';
import { isSameSpeed, NEGLIGIBLE_SCORE, relationOf, scoreText } from './rivals.ts';

type Candidate = ReadingView['candidates'][number];

interface Props {
  /** Best first. */
  readonly candidates: readonly Candidate[];
  /** The speed that the evidence is held against. */
  readonly chosenRpm: number | null;
  readonly answerRpm: number | null;
  readonly onLook: (rpm: number) => void;
}

const MOST_AT_FIRST = 4;

/** The candidates as a list of choices: the speed line for the keyboard, and for those who want the reasons. */
export function CandidatesTable(props: Props) {
  const { candidates, answerRpm } = props;
  const isRival = ({ rpm, score }: Candidate) =>
    score >= NEGLIGIBLE_SCORE || (answerRpm !== null && relationOf(rpm, answerRpm) !== null);
  const first = candidates.filter(isRival).slice(0, MOST_AT_FIRST);
  const others = candidates.filter((candidate) => !first.includes(candidate));
  return (
    <fieldset className="mt-4">
      <legend className="text-small text-muted print:hidden">Hold the evidence below against another speed</legend>
      <CandidateList {...props} candidates={first} />
      {others.length > 0 && (
        <Disclosure summary={others.length === 1 ? 'One more' : `${String(others.length)} more`}>
          <CandidateList {...props} candidates={others} />
        </Disclosure>
      )}
    </fieldset>
  );
}

function CandidateList({ candidates, chosenRpm, answerRpm, onLook }: Props) {
  return (
    <ul>
      {candidates.map((candidate) => (
        <li key={candidate.rpm} className="border-t border-line">
          <CandidateRow
            candidate={candidate}
            isChosen={chosenRpm !== null && isSameSpeed(candidate.rpm, chosenRpm)}
            relation={answerRpm === null ? null : relationOf(candidate.rpm, answerRpm)}
            onLook={onLook}
          />
        </li>
      ))}
    </ul>
  );
}

interface RowProps {
  readonly candidate: Candidate;
  readonly isChosen: boolean;
  readonly relation: ReturnType<typeof relationOf>;
  readonly onLook: (rpm: number) => void;
}

function CandidateRow({ candidate: { rpm, score, reason }, isChosen, relation, onLook }: RowProps) {
  return (
    <label
      className={`grid cursor-pointer grid-cols-[1.5rem_6.5rem_minmax(0,1fr)] items-center gap-x-2 border-l-[3px] py-1 pl-3 touch desk:grid-cols-[1.5rem_7rem_5rem_8rem_minmax(0,1fr)] ${isChosen ? 'border-l-ink' : 'border-l-transparent'}`}
    >
      <input
        type="radio"
        name="shown-speed"
        className="size-5 accent-ink print:invisible"
        checked={isChosen}
        onChange={() => {
          onLook(rpm);
        }}
      />
      <span className="text-end figures">
        <GroupedText text={numberText(rpm, 0)} /> <span className="font-sans text-small text-muted">rpm</span>
      </span>
      <span className="text-small">{relation === 'chosen' ? 'the reading' : relation}</span>
      <span className="text-small text-muted max-desk:col-span-2 max-desk:col-start-2">weight {scoreText(score)}</span>
      <span className="text-small max-desk:col-span-2 max-desk:col-start-2">
        <GroupedText text={reason} />
      </span>
    </label>
  );
}
