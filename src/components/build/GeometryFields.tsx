import { TextField } from '#components/ui/TextField.tsx';
import { GEOMETRY_PARTS, type BuildTexts, type GeometryPart } from './buildTexts.ts';

interface Props {
  readonly texts: BuildTexts;
  readonly onChange: (changes: Partial<BuildTexts>) => void;
  readonly errorOf: (field: string) => string | undefined;
}

const PARTS: Record<GeometryPart, { readonly label: string; readonly hint: string }> = {
  segments: { label: 'Commutator segments', hint: 'The copper bars that the brushes touch.' },
  poles: { label: 'Poles', hint: 'Brush sites; two in most small motors.' },
  blades: { label: 'Blades', hint: 'Of a fan or propeller on this shaft.' },
  teeth: { label: 'Gear teeth', hint: 'Of the pinion on this shaft.' },
  magnets: { label: 'Rotor magnets', hint: 'Only of a brushless motor; they come in pairs.' },
};

/** Counts of the parts that make sound events. What the motor does not have stays empty. */
export function GeometryFields({ texts, onChange, errorOf }: Props) {
  return (
    <fieldset className="grid items-start gap-4 desk:grid-cols-2">
      <legend className="mb-2 font-bold">Parts that make sound</legend>
      {GEOMETRY_PARTS.map((part) => (
        <TextField
          key={part}
          label={PARTS[part].label}
          hint={PARTS[part].hint}
          inputMode="numeric"
          autoComplete="off"
          value={texts[part]}
          error={errorOf(`geometry.${part}`)}
          onChange={(event) => {
            onChange({ [part]: event.target.value });
          }}
        />
      ))}
    </fieldset>
  );
}
