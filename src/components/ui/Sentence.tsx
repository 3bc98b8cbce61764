import type { ReactNode } from 'react';

interface Props {
  readonly children: ReactNode;
  /** `lead` for the one sentence that a view is about. */
  readonly size?: 'small' | 'body' | 'lead' | 'title';
  readonly isQuiet?: boolean;
}

const SIZES = { small: 'text-small', body: 'text-body', lead: 'text-lead', title: 'text-title' } as const;

/** A sentence, at most 62 characters wide. */
export function Sentence({ children, size = 'body', isQuiet = false }: Props) {
  return <p className={`max-w-sentence ${SIZES[size]} ${isQuiet ? 'text-muted' : ''}`}>{children}</p>;
}
