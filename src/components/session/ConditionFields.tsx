import { TextField } from '#components/ui/TextField.tsx';
import type { ConditionTexts } from './conditionTexts.ts';

interface Props {
  readonly texts: ConditionTexts;
  readonly onChange: (changes: Partial<ConditionTexts>) => void;
  readonly errorOf: (field: string) => string | undefined;
}

/** The boxes for conditions that hold for every recording of a session. Each may stay empty. */
export function ConditionFields({ texts, onChange, errorOf }: Props) {
  const box = (name: keyof ConditionTexts) => ({
    value: texts[name],
    error: errorOf(`conditions.${name}`),
    onChange: (event: { target: { value: string } }) => {
      onChange({ [name]: event.target.value });
    },
    autoComplete: 'off',
  });
  return (
    <fieldset className="grid max-w-sentence gap-4 desk:grid-cols-2">
      <legend className="mb-2 font-bold">Conditions of all recordings</legend>
      <TextField label="Supply" unit="V" inputMode="decimal" {...box('supplyVolts')} />
      <TextField label="Load" placeholder="no load, 80 mm fan, …" {...box('load')} />
      <TextField label="Air temperature" unit="°C" inputMode="decimal" {...box('ambientCelsius')} />
      <TextField label="Note" {...box('note')} />
    </fieldset>
  );
}
