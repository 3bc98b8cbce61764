import type { ComponentProps } from 'react';
import { buttonClasses, type ButtonWeight } from './buttonStyle.ts';

interface Props extends ComponentProps<'button'> {
  readonly weight?: ButtonWeight;
  /** The press is being worked on: the button stays in place and says so. */
  readonly isBusy?: boolean;
}

/** A button. While busy it keeps the focus and ignores presses. */
export function Button({ weight = 'plain', isBusy = false, className, type = 'button', onClick, ...rest }: Props) {
  return (
    <button
      type={type}
      className={buttonClasses(weight, className)}
      aria-disabled={isBusy || undefined}
      aria-busy={isBusy || undefined}
      onClick={(event) => {
        if (isBusy) event.preventDefault();
        else onClick?.(event);
      }}
      {...rest}
    />
  );
}
