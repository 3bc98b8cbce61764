import { useState } from 'react';
import { Button } from '#components/ui/Button.tsx';
import { TextField } from '#components/ui/TextField.tsx';
import { numberText } from '#lib/format/numberText.ts';
import { parseNumber } from '#lib/format/parseNumber.ts';
import { shaftSpeedRpm } from '#lib/schemas/fields.ts';
import { eventHertzFromRpm } from '#lib/units/rotation.ts';
import { showSpeed } from './shownSpeed.ts';

interface Props {
  readonly rpm: number;
  readonly isMoved: boolean;
  readonly eventsPerTurn: number;
}

/** Where the rack stands, to read and to type; and its way back to the reading. */
export function RackSpeed({ rpm, isMoved, eventsPerTurn }: Props) {
  const [typed, setTyped] = useState<string | null>(null);
  const parsed = typed === null ? null : shaftSpeedRpm.safeParse(parseNumber(typed));
  const set = () => {
    if (parsed?.success) showSpeed(parsed.data);
    if (parsed === null || parsed.success) setTyped(null);
  };
  return (
    <form
      className="grid max-w-72 gap-2 print:hidden"
      onSubmit={(event) => {
        event.preventDefault();
        set();
      }}
    >
      <TextField
        label="The rack stands at"
        unit="rpm"
        className="figures"
        inputMode="decimal"
        autoComplete="off"
        hint={`${numberText(eventHertzFromRpm(rpm, eventsPerTurn), 1)} events a second`}
        value={typed ?? numberText(rpm, 1)}
        error={parsed?.success === false ? parsed.error.issues[0]?.message : undefined}
        onChange={(event) => {
          setTyped(event.target.value);
        }}
        onBlur={set}
      />
      {isMoved && (
        <Button
          onClick={() => {
            setTyped(null);
            showSpeed(null);
          }}
        >
          Back to the reading
        </Button>
      )}
    </form>
  );
}
