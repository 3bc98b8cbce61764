import { useEffect, useRef, type ChangeEvent } from 'react';
import { buttonClasses, type ButtonWeight } from '#components/ui/buttonStyle.ts';

interface Props {
  readonly label: string;
  readonly accept: string;
  readonly onFiles: (files: File[]) => void;
  readonly weight?: ButtonWeight;
  /** Opens the phone's recorder instead of its files. */
  readonly isRecorder?: boolean;
  readonly className?: string;
}

/** A file input that looks like a button: its label is what one presses, the input keeps the keyboard. */
export function FileChoice({ label, accept, onFiles, weight = 'plain', isRecorder = false, className = '' }: Props) {
  const inputRef = useRef<HTMLInputElement>(null);

  // Files chosen before the script arrived are taken too.
  useEffect(() => {
    const input = inputRef.current;
    if (input?.files?.length) take(input, onFiles);
  }, [onFiles]);

  return (
    <label
      className={buttonClasses(
        weight,
        `has-focus-visible:outline-2 has-focus-visible:outline-offset-3 has-focus-visible:outline-ink ${className}`,
      )}
    >
      {label}
      <input
        ref={inputRef}
        type="file"
        className="sr-only"
        accept={accept}
        {...(isRecorder ? { capture: 'environment' } : { multiple: true })}
        onChange={(event: ChangeEvent<HTMLInputElement>) => {
          take(event.target, onFiles);
        }}
      />
    </label>
  );
}

/** Empties the input, so that the same file can be chosen again. */
function take(input: HTMLInputElement, onFiles: (files: File[]) => void): void {
  const files = [...(input.files ?? [])];
  input.value = '';
  if (files.length > 0) onFiles(files);
}
