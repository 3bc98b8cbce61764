import type { ReactNode } from 'react';

interface Props {
  readonly summary: ReactNode;
  readonly isOpen?: boolean;
  readonly children: ReactNode;
}

/** Something that stays closed until it is wanted; works before any script. */
export function Disclosure({ summary, isOpen = false, children }: Props) {
  return (
    <details open={isOpen} className="border-t border-line not-open:print:hidden">
      <summary className="flex items-center py-2 underline underline-offset-4 touch">{summary}</summary>
      <div className="pb-4">{children}</div>
    </details>
  );
}
