import type { ReactNode } from 'react';
import { cx } from './classes';
import { Icon, type IconName } from './Icon';

/** moss: settled; weld: caution; woad: in hand; madder: pressing; plain: neither. */
export type Tone = 'moss' | 'weld' | 'woad' | 'madder' | 'plain';

/** A state in words on a wash of its dye. */
export function StatusBadge({
  tone = 'plain',
  icon,
  children,
}: {
  tone?: Tone;
  icon?: IconName;
  children: ReactNode;
}) {
  return (
    <span className={cx('st', tone === 'plain' ? 'flat' : tone)}>
      {icon && <Icon name={icon} small />}
      {children}
    </span>
  );
}

/** A person's initials. The name stands beside it, so it is hidden from assistive technology. */
export function Avatar({
  initials,
  tone = 'woad',
  small,
}: {
  initials: string;
  tone?: Exclude<Tone, 'plain'>;
  small?: boolean;
}) {
  const dye = { woad: '', madder: 'm', moss: 's', weld: 'w' }[tone];
  return (
    <span className={cx('ava', dye, small && 'sm')} aria-hidden="true">
      {initials}
    </span>
  );
}
