import { Button, type ButtonProps } from './Button';
import { cx } from './classes';
import { Icon, type IconName } from './Icon';

export interface IconButtonProps extends Omit<ButtonProps, 'icon' | 'iconEnd' | 'children'> {
  icon: IconName;
  /** The accessible name; also shown as a title. */
  label: string;
}

/** A square button with a picture only. */
export function IconButton({ icon, label, className, ...rest }: IconButtonProps) {
  return (
    <Button {...rest} className={cx('ico', className)} aria-label={label} title={label}>
      <Icon name={icon} small={rest.size === 'small'} />
    </Button>
  );
}
