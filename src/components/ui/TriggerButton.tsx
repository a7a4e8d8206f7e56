import type { ReactNode } from 'react';
import { Button as AriaButton } from 'react-aria-components';
import { buttonClass, type ButtonKind, type ButtonSize } from './Button';
import { cx } from './classes';
import { Icon, type IconName } from './Icon';

export interface TriggerProps {
  /** Words on the button, or its accessible name when `bare`. */
  trigger: ReactNode;
  /** `select` looks like a select (with a muted prefix); `chip` is the dashed chip; the rest are buttons. */
  look?: ButtonKind | 'select' | 'chip';
  size?: ButtonSize;
  icon?: IconName;
  /** Only the icon; `trigger` must then be text, which becomes the accessible name. */
  bare?: boolean;
  /** Muted word before the text, as in "Colour  Helpfulness" (look `select`). */
  prefix?: ReactNode;
  className?: string;
  isDisabled?: boolean;
}

/** The button that opens a menu or a popover. */
export function TriggerButton(props: TriggerProps) {
  const { trigger, look = 'default', size, icon, bare, prefix, className, isDisabled } = props;
  const isSelect = look === 'select';
  const classes = isSelect
    ? cx('sel', size === 'small' && 'sm', className)
    : look === 'chip'
      ? cx('chip add', className)
      : buttonClass(look, size, cx(bare && 'ico', className));
  return (
    <AriaButton className={classes} isDisabled={isDisabled} aria-label={bare ? String(trigger) : undefined}>
      {(icon || look === 'chip') && <Icon name={icon ?? 'plus'} small />}
      {prefix && <span className="lab">{prefix}</span>}
      {!bare && (isSelect ? <span className="val">{trigger}</span> : trigger)}
      {isSelect && <Icon name="chevron-down" small className="chev" />}
    </AriaButton>
  );
}
