import type { ReactNode } from 'react';
import { NOTE_MAXIMUM_CHARACTERS } from '#lib/schemas/fields.ts';
import { ChoiceBlank, TypedBlank } from './Blank.tsx';
import type { ConditionErrors, UploadConditions } from './uploadConditions.ts';

export interface Choice {
  readonly id: string;
  readonly name: string;
}

interface Props {
  readonly conditions: UploadConditions;
  readonly onChange: (changes: Partial<UploadConditions>) => void;
  readonly errors: ConditionErrors;
  readonly builds: readonly Choice[];
  /** Null where the page belongs to one session already. */
  readonly sessions: readonly Choice[] | null;
}

const NUMBER_CHARACTERS = 6;
const NOTE_CHARACTERS = 20;

/** The conditions of the files that come next, as a sentence with blanks. Every blank may stay empty. */
export function ConditionsSentence({ conditions, onChange, errors, builds, sessions }: Props) {
  const blank = (name: keyof UploadConditions) => ({
    value: conditions[name],
    error: errors[name],
    onChange: (value: string) => {
      onChange({ [name]: value });
    },
  });
  const number = { widthCharacters: NUMBER_CHARACTERS, isNumber: true };
  return (
    <fieldset className="flex flex-wrap items-center gap-x-3 gap-y-3">
      <legend className="sr-only">Conditions of the recordings that come next</legend>
      <Phrase>
        The motor is <ChoiceBlank label="Build" noneName="not a build here" choices={builds} {...blank('buildId')} />
      </Phrase>
      {conditions.buildId === '' && (
        <Phrase>
          with <TypedBlank label="Sound events per turn" {...number} {...blank('eventsPerTurn')} /> sound events a turn
          (empty: one)
        </Phrase>
      )}
      <Phrase>
        at <TypedBlank label="Supply voltage in volts" {...number} {...blank('supplyVolts')} /> V,
      </Phrase>
      <Phrase>
        drawing <TypedBlank label="Current in amperes" {...number} {...blank('currentAmps')} /> A.
      </Phrase>
      {sessions !== null && (
        <Phrase>
          It belongs to
          <ChoiceBlank label="Session" noneName="no session" choices={sessions} {...blank('sessionId')} />
        </Phrase>
      )}
      <Phrase>
        Note:
        <TypedBlank
          label="Note"
          widthCharacters={NOTE_CHARACTERS}
          maximumCharacters={NOTE_MAXIMUM_CHARACTERS}
          {...blank('note')}
        />
      </Phrase>
    </fieldset>
  );
}

/** Words that stay with their blank when the line breaks. */
function Phrase({ children }: { children: ReactNode }) {
  return <span className="inline-flex max-w-full items-center gap-2 max-desk:flex-wrap">{children}</span>;
}
