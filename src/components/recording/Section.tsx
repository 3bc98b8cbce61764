import { useId, useState, type ReactNode } from 'react';

interface Props {
  readonly title: string;
  /** What the section shows, in one sentence; on the phone it stands alone until the section is opened. */
  readonly sentence: ReactNode;
  readonly children: ReactNode;
}

/** A part of the argument. Open on the desk; on the phone a heading with its sentence that opens. */
export function Section({ title, sentence, children }: Props) {
  const [isOpen, setIsOpen] = useState(false);
  const id = useId();
  return (
    <section aria-labelledby={`${id}-title`} className="mt-6 border-t border-line pt-4 desk:mt-10">
      <h2 id={`${id}-title`}>
        <span className="max-desk:hidden print:inline">{title}</span>
        <button
          type="button"
          className="flex w-full items-center justify-between text-start font-bold touch desk:hidden print:hidden"
          aria-expanded={isOpen}
          aria-controls={`${id}-content`}
          onClick={() => {
            setIsOpen(!isOpen);
          }}
        >
          {title}
          <span className="font-normal underline underline-offset-4">{isOpen ? 'Close' : 'Open'}</span>
        </button>
      </h2>
      <div className="max-w-sentence">{sentence}</div>
      <div id={`${id}-content`} className={`mt-4 ${isOpen ? '' : 'max-desk:hidden print:block'}`}>
        {children}
      </div>
    </section>
  );
}
