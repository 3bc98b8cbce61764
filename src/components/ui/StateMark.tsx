import type { ReactNode } from 'react';

/** Each state is a shape and a word beside its colour. `undecided` is half filled and hatched, never amber. */
export type StateShape = 'within' | 'outside' | 'undecided' | 'waiting' | 'working' | 'flagged';

const COLOURS: Record<StateShape, string> = {
  within: 'text-within',
  outside: 'text-outside',
  undecided: 'text-ink',
  waiting: 'text-muted',
  working: 'text-ink',
  flagged: 'text-ink',
};

interface Props {
  readonly shape: StateShape;
  /** The word of the state. */
  readonly children: ReactNode;
}

/** A state as a shape with its word. */
export function StateMark({ shape, children }: Props) {
  return (
    <span className={`inline-flex items-baseline gap-2 ${COLOURS[shape]}`}>
      <svg viewBox="0 0 16 16" className="size-[0.8em] shrink-0 self-center overflow-visible" aria-hidden="true">
        {SHAPES[shape]}
      </svg>
      <span>{children}</span>
    </span>
  );
}

const outline = { fill: 'none', stroke: 'currentColor', strokeWidth: 2 } as const;
const SHAPES: Record<StateShape, ReactNode> = {
  within: <circle cx="8" cy="8" r="7" fill="currentColor" />,
  outside: (
    <g {...outline}>
      <rect x="1" y="1" width="14" height="14" />
      <path d="M4.5 4.5l7 7M11.5 4.5l-7 7" />
    </g>
  ),
  undecided: (
    <g {...outline}>
      <circle cx="8" cy="8" r="7" />
      <path d="M8 1v14M5.5 2v12M3 4v8" strokeWidth="1.5" />
    </g>
  ),
  waiting: <circle cx="8" cy="8" r="7" {...outline} />,
  working: <path d="M8 1a7 7 0 1 1-7 7" {...outline} strokeWidth="3" />,
  flagged: <path d="M8 1l7 7-7 7-7-7z" {...outline} />,
};
