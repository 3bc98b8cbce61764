import { SESSION_PURPOSES, type SessionPurpose } from '#lib/schemas/session.ts';
import { PURPOSE_WORDS } from './purposeWords.ts';

interface Props {
  readonly chosen: SessionPurpose;
  readonly onChoose: (purpose: SessionPurpose) => void;
}

/** The purpose of a session, each with what comes out of it. */
export function PurposeField({ chosen, onChoose }: Props) {
  return (
    <fieldset className="max-w-sentence">
      <legend className="mb-2 font-bold">Purpose</legend>
      {SESSION_PURPOSES.map((purpose) => (
        <label
          key={purpose}
          className="flex items-start gap-3 border-l-[3px] border-transparent py-2 pl-3 touch has-checked:border-ink"
        >
          <input
            type="radio"
            name="purpose"
            className="mt-1 size-4 shrink-0 accent-ink"
            value={purpose}
            checked={purpose === chosen}
            onChange={() => {
              onChoose(purpose);
            }}
          />
          <span>
            {PURPOSE_WORDS[purpose].name}
            <span className="block text-small text-muted">{PURPOSE_WORDS[purpose].explanation}</span>
          </span>
        </label>
      ))}
    </fieldset>
  );
}
