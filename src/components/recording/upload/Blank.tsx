import { useId, type ChangeEvent, type ReactNode } from 'react';
import { FIELD_CLASSES } from '#components/ui/fieldStyle.ts';

interface BlankProps {
  /** Read instead of the sentence around the blank. */
  readonly label: string;
  readonly value: string;
  readonly onChange: (value: string) => void;
  readonly error?: string | undefined;
}

interface TypedBlankProps extends BlankProps {
  /** Width in characters. */
  readonly widthCharacters: number;
  readonly isNumber?: boolean;
  readonly maximumCharacters?: number;
}

/** A blank in a sentence that takes typing; a number is taken with point or comma. */
export function TypedBlank({
  label,
  value,
  onChange,
  error,
  widthCharacters,
  isNumber,
  maximumCharacters,
}: TypedBlankProps) {
  const id = useId();
  return (
    <BlankFrame id={id} error={error}>
      <input
        aria-label={label}
        aria-invalid={error === undefined ? undefined : true}
        aria-describedby={error === undefined ? undefined : id}
        className={`${FIELD_CLASSES} max-w-full`}
        style={{ inlineSize: `calc(${String(widthCharacters)}ch + 1.75rem)` }}
        inputMode={isNumber ? 'decimal' : 'text'}
        autoComplete="off"
        maxLength={maximumCharacters}
        value={value}
        onChange={(event: ChangeEvent<HTMLInputElement>) => {
          onChange(event.target.value);
        }}
      />
    </BlankFrame>
  );
}

interface ChoiceBlankProps extends BlankProps {
  readonly choices: readonly { readonly id: string; readonly name: string }[];
  /** The choice of nothing. */
  readonly noneName: string;
}

/** A blank in a sentence that takes one of a list. */
export function ChoiceBlank({ label, value, onChange, error, choices, noneName }: ChoiceBlankProps) {
  const id = useId();
  return (
    <BlankFrame id={id} error={error}>
      <select
        aria-label={label}
        aria-invalid={error === undefined ? undefined : true}
        aria-describedby={error === undefined ? undefined : id}
        className={`${FIELD_CLASSES} max-w-full desk:max-w-72`}
        value={value}
        onChange={(event) => {
          onChange(event.target.value);
        }}
      >
        <option value="">{noneName}</option>
        {choices.map((choice) => (
          <option key={choice.id} value={choice.id}>
            {choice.name}
          </option>
        ))}
      </select>
    </BlankFrame>
  );
}

function BlankFrame({ id, error, children }: { id: string; error: string | undefined; children: ReactNode }) {
  return (
    <span className="inline-block max-w-full align-middle">
      {children}
      {error !== undefined && (
        <span id={id} role="alert" className="block text-small text-outside">
          <span aria-hidden="true">✕ </span>
          {error}
        </span>
      )}
    </span>
  );
}
