import { useEffect, useRef, type InputHTMLAttributes, type ReactNode } from 'react';
import { cx } from './classes';

type InputProps = Omit<InputHTMLAttributes<HTMLInputElement>, 'type' | 'onChange'>;

export interface CheckboxProps extends InputProps {
  label: ReactNode;
  hint?: ReactNode;
  hideLabel?: boolean;
  /** Some, but not all. */
  indeterminate?: boolean;
  onChange?: (checked: boolean, event: React.ChangeEvent<HTMLInputElement>) => void;
}

/** A check box: a real input, so it also works inside a plain form. */
export function Checkbox({
  label,
  hint,
  hideLabel,
  indeterminate = false,
  onChange,
  className,
  ...rest
}: CheckboxProps) {
  const box = useRef<HTMLInputElement>(null);
  useEffect(() => {
    if (box.current) box.current.indeterminate = indeterminate;
  }, [indeterminate]);
  return (
    <label className={cx('check', !!hint && 'top', className)}>
      <input
        {...rest}
        ref={box}
        type="checkbox"
        className="chk"
        onChange={(e) => onChange?.(e.target.checked, e)}
      />
      <span className={hideLabel ? 'vh' : undefined}>
        {label}
        {hint && (
          <span className="hint" style={{ display: 'block', marginTop: 0 }}>
            {hint}
          </span>
        )}
      </span>
    </label>
  );
}

export interface SwitchProps extends InputProps {
  label: ReactNode;
  hint?: ReactNode;
  hideLabel?: boolean;
  onChange?: (on: boolean) => void;
}

/** On or off, in force at once. Words at the left, switch at the right. */
export function Switch({ label, hint, hideLabel, onChange, className, ...rest }: SwitchProps) {
  return (
    <label className={cx('swrow', className)}>
      <span className={hideLabel ? 'vh' : undefined}>
        <span className={hint ? 'b' : undefined}>{label}</span>
        {hint && (
          <span className="hint" style={{ display: 'block', marginTop: 0 }}>
            {hint}
          </span>
        )}
      </span>
      <input
        {...rest}
        type="checkbox"
        role="switch"
        className="sw"
        onChange={(e) => onChange?.(e.target.checked)}
      />
    </label>
  );
}
