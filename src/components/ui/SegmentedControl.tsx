import { useRef, type KeyboardEvent, type ReactNode } from 'react';
import { cx } from './classes';

export interface SegmentedControlProps<T extends string> {
  /** What is being chosen, for assistive technology. */
  label: string;
  options: readonly { value: T; label: ReactNode; disabled?: boolean }[];
  value: T;
  onChange: (value: T) => void;
  /** Takes the whole width. */
  full?: boolean;
}

/** A few views of one thing (Map | List). A radio group: arrow keys move, one tab stop. */
export function SegmentedControl<T extends string>({
  label,
  options,
  value,
  onChange,
  full,
}: SegmentedControlProps<T>) {
  const group = useRef<HTMLDivElement>(null);
  const onKeyDown = (event: KeyboardEvent) => {
    const step = { ArrowRight: 1, ArrowDown: 1, ArrowLeft: -1, ArrowUp: -1 }[event.key];
    if (!step) return;
    event.preventDefault();
    const open = options.filter((option) => !option.disabled);
    const next =
      open[(open.findIndex((option) => option.value === value) + step + open.length) % open.length];
    if (!next) return;
    onChange(next.value);
    group.current?.querySelectorAll('button')[options.indexOf(next)]?.focus();
  };
  return (
    <div
      role="radiogroup"
      aria-label={label}
      className={cx('seg', full && 'full')}
      ref={group}
      onKeyDown={onKeyDown}
    >
      {options.map((option) => (
        <button
          key={option.value}
          type="button"
          role="radio"
          aria-checked={option.value === value}
          tabIndex={option.value === value ? 0 : -1}
          disabled={option.disabled}
          onClick={() => onChange(option.value)}
        >
          {option.label}
        </button>
      ))}
    </div>
  );
}
