import type { ReactNode } from 'react';
import { cx } from './classes';
import { Icon } from './Icon';

export interface ChipProps {
  children: ReactNode;
  /** Adds the cross. Say what is removed, e.g. `Remove Ties, 3 or more`. */
  onRemove?: () => void;
  removeLabel?: string;
  /** Madder: the filter that comes from the brushed range. */
  on?: boolean;
}

/** A filter in force. */
export function Chip({ children, onRemove, removeLabel, on }: ChipProps) {
  const fallback = typeof children === 'string' ? `Remove ${children}` : 'Remove';
  return (
    <span className={cx('chip', on && 'on')}>
      {children}
      {onRemove && (
        <button type="button" className="x" aria-label={removeLabel ?? fallback} onClick={onRemove}>
          <Icon name="close" />
        </button>
      )}
    </span>
  );
}

/** The dashed chip that adds a filter. Works as a Menu or Popover trigger too. */
export function AddChip({ children = 'Add filter', ...rest }: React.ButtonHTMLAttributes<HTMLButtonElement>) {
  return (
    <button type="button" {...rest} className="chip add">
      <Icon name="plus" small />
      {children}
    </button>
  );
}
