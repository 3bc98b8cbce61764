import type { ReactNode } from 'react';
import { StateMark, type StateShape } from './StateMark.tsx';

interface Props {
  /** What kind of state it is; decides shape, colour and how soon it is read out. */
  readonly shape: StateShape;
  /** The word beside the shape: "Saved", "Not uploaded". */
  readonly title: string;
  /** What happened, why, what to do. */
  readonly children?: ReactNode;
}

/** A message in the page: a rule on its left, a shape with a word, a sentence. */
export function Notice({ shape, title, children }: Props) {
  return (
    <div role={shape === 'outside' ? 'alert' : 'status'} className="max-w-sentence border-l-[3px] border-ink py-1 pl-3">
      <StateMark shape={shape}>
        <strong>{title}</strong>
      </StateMark>
      {children !== undefined && <div>{children}</div>}
    </div>
  );
}
