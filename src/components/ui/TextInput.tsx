import type { InputHTMLAttributes, ReactNode, Ref, TextareaHTMLAttributes } from 'react';
import { cx } from './classes';
import { Field, type FieldProps } from './Field';
import { Icon, type IconName } from './Icon';

export interface TextInputProps
  extends FieldProps, Omit<InputHTMLAttributes<HTMLInputElement>, 'size' | 'className'> {
  size?: 'default' | 'small' | 'large';
  icon?: IconName;
  /** Shown inside the field at its end, such as "%" or "days". */
  unit?: ReactNode;
  ref?: Ref<HTMLInputElement>;
}

/** One line of text. All attributes of an input pass through. */
export function TextInput(props: TextInputProps) {
  const { label, hint, error, optional, hideLabel, className, size, icon, unit, id, ...input } = props;
  return (
    <Field {...{ label, hint, error, optional, hideLabel, className }} id={id}>
      {(wiring) => (
        <div className="inpw">
          {icon && <Icon name={icon} small />}
          <input
            type="text"
            {...input}
            {...wiring}
            className={cx('inp', size === 'small' && 'sm', size === 'large' && 'touch')}
          />
          {unit && <span className="unit">{unit}</span>}
        </div>
      )}
    </Field>
  );
}

export interface TextAreaProps
  extends FieldProps, Omit<TextareaHTMLAttributes<HTMLTextAreaElement>, 'className'> {
  ref?: Ref<HTMLTextAreaElement>;
}

/** Several lines of text. */
export function TextArea({ label, hint, error, optional, hideLabel, className, id, ...area }: TextAreaProps) {
  return (
    <Field {...{ label, hint, error, optional, hideLabel, className }} id={id}>
      {(wiring) => <textarea rows={3} {...area} {...wiring} className="inp" />}
    </Field>
  );
}
