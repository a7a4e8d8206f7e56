import { Icon } from './Icon';

export interface StepperProps {
  label: string;
  steps: readonly { label: string; href?: string }[];
  /** Index of the step in hand; the ones before it are done. */
  current: number;
}

/** Where one is in a piece of work of a few steps. Done steps may be links. */
export function Stepper({ label, steps, current }: StepperProps) {
  return (
    <ol className="steps" aria-label={label}>
      {steps.map((step, i) => {
        const done = i < current;
        const inside = (
          <>
            <i aria-hidden="true">{done ? <Icon name="check" /> : i + 1}</i>
            {step.label}
            {done && <span className="vh">, done</span>}
          </>
        );
        return (
          <li
            key={step.label}
            className={done ? 'ok' : i === current ? 'on' : undefined}
            aria-current={i === current ? 'step' : undefined}
          >
            {done && step.href ? <a href={step.href}>{inside}</a> : inside}
          </li>
        );
      })}
    </ol>
  );
}
