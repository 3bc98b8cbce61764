import { useId, type ComponentProps, type ReactNode } from 'react';
import { describedBy, FieldFrame } from './FieldFrame.tsx';
import { FIELD_CLASSES } from './fieldStyle.ts';

interface Props extends Omit<ComponentProps<'textarea'>, 'children'> {
  readonly label: string;
  readonly hint?: ReactNode;
  readonly error?: string | undefined;
}

/** Several lines of typing with label, hint and error. */
export function TextArea({ label, hint, error, id: givenId, className, ...rest }: Props) {
  const ownId = useId();
  const id = givenId ?? ownId;
  return (
    <FieldFrame id={id} label={label} hint={hint} error={error}>
      <textarea
        id={id}
        rows={3}
        className={`${FIELD_CLASSES} ${className ?? ''}`}
        aria-invalid={error === undefined ? undefined : true}
        aria-describedby={describedBy(id, { hint, error })}
        {...rest}
      />
    </FieldFrame>
  );
}
