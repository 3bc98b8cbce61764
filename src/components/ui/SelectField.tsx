import { useId, type ComponentProps, type ReactNode } from 'react';
import { describedBy, FieldFrame } from './FieldFrame.tsx';
import { FIELD_CLASSES } from './fieldStyle.ts';

interface Props extends ComponentProps<'select'> {
  readonly label: string;
  readonly hint?: ReactNode;
  readonly error?: string | undefined;
}

/** One choice of a list, with label, hint and error; the options are children. */
export function SelectField({ label, hint, error, id: givenId, className, children, ...rest }: Props) {
  const ownId = useId();
  const id = givenId ?? ownId;
  return (
    <FieldFrame id={id} label={label} hint={hint} error={error}>
      <select
        id={id}
        className={`${FIELD_CLASSES} ${className ?? ''}`}
        aria-invalid={error === undefined ? undefined : true}
        aria-describedby={describedBy(id, { hint, error })}
        {...rest}
      >
        {children}
      </select>
    </FieldFrame>
  );
}
