import { useId, type ReactNode } from 'react';
import { Icon } from './Icon';

export interface FieldProps {
  label: ReactNode;
  /** Said once under the field, before anything went wrong. */
  hint?: ReactNode;
  /** What to do about a wrong value. Replaces the hint. */
  error?: ReactNode;
  /** Adds "(optional)" to the label. */
  optional?: boolean;
  hideLabel?: boolean;
  className?: string;
}

export interface FieldWiring {
  id: string;
  'aria-describedby': string | undefined;
  'aria-invalid': true | undefined;
}

/** Label, field, hint and error, joined for assistive technology. The child receives the wiring. */
export function Field(props: FieldProps & { id?: string; children: (wiring: FieldWiring) => ReactNode }) {
  const made = useId();
  const id = props.id ?? made;
  const note = `${id}-note`;
  const described = props.error || props.hint ? note : undefined;
  return (
    <div className={props.className}>
      <label className={props.hideLabel ? 'vh' : 'f'} htmlFor={id}>
        {props.label}
        {props.optional && <span className="opt"> (optional)</span>}
      </label>
      {props.children({ id, 'aria-describedby': described, 'aria-invalid': props.error ? true : undefined })}
      <FieldNote id={note} hint={props.hint} error={props.error} />
    </div>
  );
}

/** The line under a field. An error is announced when it appears. */
export function FieldNote({ id, hint, error }: { id: string; hint?: ReactNode; error?: ReactNode }) {
  if (error) {
    return (
      <div className="err" id={id} role="alert">
        <Icon name="warning" small />
        <span>{error}</span>
      </div>
    );
  }
  return hint ? (
    <div className="hint" id={id}>
      {hint}
    </div>
  ) : null;
}
