import type { ReactNode } from 'react';
import { cx } from './classes';
import { Icon, type IconName } from './Icon';

export type BannerTone = 'caution' | 'error' | 'info' | 'done' | 'offline';

/** Dye and picture of each tone; shared with Banner.astro. */
export const BANNER_LOOK: Record<BannerTone, { dye: string; icon: IconName }> = {
  caution: { dye: '', icon: 'info' },
  error: { dye: 'madder', icon: 'warning' },
  info: { dye: 'woad', icon: 'info' },
  done: { dye: 'moss', icon: 'check' },
  offline: { dye: '', icon: 'offline' },
};

export interface BannerProps {
  tone?: BannerTone;
  /** The sentence in bold that says what it is. */
  title?: ReactNode;
  children?: ReactNode;
  /** Buttons at the end. */
  actions?: ReactNode;
  icon?: IconName;
  /** Read out when it appears. Default: errors and offline. */
  live?: boolean;
}

/** A message that stays on the page: what it is, what it means, one next step. */
export function Banner({ tone = 'caution', title, children, actions, icon, live }: BannerProps) {
  const look = BANNER_LOOK[tone];
  const role =
    (live ?? (tone === 'error' || tone === 'offline')) ? (tone === 'error' ? 'alert' : 'status') : undefined;
  return (
    <div className={cx('note', look.dye)} role={role}>
      <Icon name={icon ?? look.icon} />
      <div className="grow">
        {title && <b>{title}</b>} <span className={title ? 'ink2' : undefined}>{children}</span>
      </div>
      {actions && <div className="acts">{actions}</div>}
    </div>
  );
}
