import type { AnchorHTMLAttributes } from 'react';
import { buttonClass, type ButtonKind, type ButtonSize } from './Button';
import { Icon, type IconName } from './Icon';

export interface ButtonLinkProps extends AnchorHTMLAttributes<HTMLAnchorElement> {
  kind?: ButtonKind;
  size?: ButtonSize;
  icon?: IconName;
}

/** A link that looks like a button (it goes somewhere; a Button does something). */
export function ButtonLink({ kind, size, icon, className, children, ...rest }: ButtonLinkProps) {
  return (
    <a {...rest} className={buttonClass(kind, size, className)}>
      {icon && <Icon name={icon} small />}
      {children}
    </a>
  );
}
