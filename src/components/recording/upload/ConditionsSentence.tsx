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
const NOTE_CHARACTERS = 24;

/** The conditions of the files that come next, as a sentence with blanks. Every blank may stay empty. */
export function ConditionsSentence({ conditions, onChange, errors, builds, sessions }: Props) {
  const blank = (name: keyof UploadConditions) => ({
    value: conditions[name],
    error: errors[name],
    onChange: (value: string) => {
      onChange({ [name]: value });
    },
  });
  return (
    <fieldset className="flex flex-wrap items-center gap-x-2 gap-y-3">
      <legend className="sr-only">Conditions of the recordings that come next</legend>
      <span>The motor is</span>
      <ChoiceBlank label="Build" noneName="not a build here" choices={builds} {...blank('buildId')} />
      {conditions.buildId === '' && (
        <>
          <span>with</span>
          <TypedBlank
            label="Sound events per turn"
            widthCharacters={NUMBER_CHARACTERS}
            isNumber
            {...blank('eventsPerTurn')}
          />
          <span>sound events a turn (empty: one)</span>
        </>
      )}
      <span>at</span>
      <TypedBlank
        label="Supply voltage in volts"
        widthCharacters={NUMBER_CHARACTERS}
        isNumber
        {...blank('supplyVolts')}
      />
      <span>V, drawing</span>
      <TypedBlank label="Current in amperes" widthCharacters={NUMBER_CHARACTERS} isNumber {...blank('currentAmps')} />
      <span>A.</span>
      {sessions !== null && (
        <>
          <span>It belongs to</span>
          <ChoiceBlank label="Session" noneName="no session" choices={sessions} {...blank('sessionId')} />
        </>
      )}
      <span>Note:</span>
      <TypedBlank
        label="Note"
        widthCharacters={NOTE_CHARACTERS}
        maximumCharacters={NOTE_MAXIMUM_CHARACTERS}
        {...blank('note')}
      />
    </fieldset>
  );
}
