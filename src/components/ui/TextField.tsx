import { useId, type ComponentProps, type ReactNode } from 'react';
import { describedBy, FieldFrame } from './FieldFrame.tsx';
import { FIELD_CLASSES } from './fieldStyle.ts';

interface Props extends Omit<ComponentProps<'input'>, 'children'> {
  readonly label: string;
  readonly hint?: ReactNode;
  readonly error?: string | undefined;
  /** Stands behind the box and is read with the label: V, A, rpm. */
  readonly unit?: string;
}

/** One line of typing with its label, unit, hint and error. */
export function TextField({ label, hint, error, unit, id: givenId, className, ...rest }: Props) {
  const ownId = useId();
  const id = givenId ?? ownId;
  const field = (
    <input
      id={id}
      className={`${FIELD_CLASSES} ${className ?? ''}`}
      aria-invalid={error === undefined ? undefined : true}
      aria-describedby={describedBy(id, { hint, error })}
      {...rest}
    />
  );
  return (
    <FieldFrame id={id} label={unit === undefined ? label : `${label} (${unit})`} hint={hint} error={error}>
      {field}
    </FieldFrame>
  );
}
