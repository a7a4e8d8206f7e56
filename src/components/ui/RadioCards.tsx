import { useId, type ReactNode } from 'react';
import { FieldNote } from './Field';

export interface RadioCard<T extends string> {
  value: T;
  label: ReactNode;
  hint?: ReactNode;
  disabled?: boolean;
}

export interface RadioCardsProps<T extends string> {
  legend: ReactNode;
  hideLegend?: boolean;
  options: readonly RadioCard<T>[];
  value: T | null;
  onChange: (value: T) => void;
  name?: string;
  hint?: ReactNode;
  error?: ReactNode;
}

/** One of several, each with a line of explanation. */
export function RadioCards<T extends string>(props: RadioCardsProps<T>) {
  const id = useId();
  const { options, value, onChange, name = id } = props;
  return (
    <fieldset aria-describedby={props.hint || props.error ? `${id}-note` : undefined}>
      <legend className={props.hideLegend ? 'vh' : 'f'}>{props.legend}</legend>
      {options.map((option) => (
        <label className="choice" key={option.value}>
          <input
            type="radio"
            className="rad"
            name={name}
            value={option.value}
            checked={option.value === value}
            disabled={option.disabled}
            onChange={() => onChange(option.value)}
          />
          <span>
            <b>{option.label}</b>
            {option.hint && <span className="hintline">{option.hint}</span>}
          </span>
        </label>
      ))}
      <FieldNote id={`${id}-note`} hint={props.hint} error={props.error} />
    </fieldset>
  );
}
