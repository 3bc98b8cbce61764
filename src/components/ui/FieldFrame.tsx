import type { ReactNode } from 'react';

interface Props {
  readonly id: string;
  readonly label: string;
  readonly hint?: ReactNode;
  readonly error?: string | undefined;
  readonly children: ReactNode;
}

/** Ids of the texts that describe a field, for aria-describedby. */
export function describedBy(id: string, { hint, error }: { hint?: ReactNode; error?: string | undefined }) {
  const ids = [hint !== undefined && `${id}-hint`, error !== undefined && `${id}-error`].filter(Boolean);
  return ids.length === 0 ? undefined : ids.join(' ');
}

/** Label, hint and error around one field. */
export function FieldFrame({ id, label, hint, error, children }: Props) {
  return (
    <div className="grid gap-1">
      <label htmlFor={id}>{label}</label>
      {hint !== undefined && (
        <p id={`${id}-hint`} className="text-small text-muted">
          {hint}
        </p>
      )}
      {children}
      {error !== undefined && (
        <p id={`${id}-error`} className="text-outside">
          <span aria-hidden="true">✕ </span>
          {error}
        </p>
      )}
    </div>
  );
}
