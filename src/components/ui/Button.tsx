import type { ButtonHTMLAttributes, ReactNode, Ref } from 'react';
import { cx } from './classes';
import { Icon, type IconName } from './Icon';

export type ButtonKind = 'default' | 'primary' | 'quiet' | 'danger';
export type ButtonSize = 'default' | 'small' | 'large';

export interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  kind?: ButtonKind;
  /** 34 px, 28 in toolbars, 44; the default grows to 44 on a phone by itself. */
  size?: ButtonSize;
  icon?: IconName;
  iconEnd?: IconName;
  /** Shows a turning thread and refuses clicks; say what is happening in the words. */
  pending?: boolean;
  /** Keeps the button pressed (aria-pressed). */
  pressed?: boolean;
  ref?: Ref<HTMLButtonElement>;
  children?: ReactNode;
}

/** The classes of a button, for links that look like one. */
export function buttonClass(
  kind: ButtonKind = 'default',
  size: ButtonSize = 'default',
  extra?: string,
): string {
  return cx(
    'btn',
    kind === 'primary' && 'pri',
    kind === 'quiet' && 'quiet',
    kind === 'danger' && 'warn',
    size === 'small' && 'sm',
    size === 'large' && 'big',
    extra,
  );
}

/** A button. One primary in each panel. `type` is `button` unless said otherwise. */
export function Button(props: ButtonProps) {
  const {
    kind,
    size,
    icon,
    iconEnd,
    pending,
    pressed,
    className,
    children,
    type = 'button',
    onClick,
    ...rest
  } = props;
  return (
    <button
      {...rest}
      type={type}
      className={buttonClass(kind, size, className)}
      aria-pressed={pressed}
      aria-disabled={pending ? true : undefined}
      data-pending={pending ? '' : undefined}
      onClick={pending ? (event) => event.preventDefault() : onClick}
    >
      {pending ? <Icon name="spinner" small className="spin" /> : icon && <Icon name={icon} small />}
      {children}
      {iconEnd && <Icon name={iconEnd} small />}
    </button>
  );
}
