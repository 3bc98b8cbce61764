import type { ComponentProps } from 'react';
import { buttonClasses, type ButtonWeight } from './buttonStyle.ts';

interface Props extends ComponentProps<'a'> {
  readonly weight?: ButtonWeight;
}

/** A link that looks like a button: it goes somewhere, it changes nothing. */
export function ButtonLink({ weight = 'plain', className, children, ...rest }: Props) {
  return (
    <a className={buttonClasses(weight, className)} {...rest}>
      {children}
    </a>
  );
}
