import { useState } from 'react';
import { TextInput, type TextInputProps } from './TextInput';

export interface NumberInputProps extends Omit<
  TextInputProps,
  'value' | 'defaultValue' | 'onChange' | 'min' | 'max' | 'step'
> {
  value: number | null;
  /** Called with a number inside the limits, or null for an empty field. Never with a half-typed text. */
  onChange: (value: number | null) => void;
  min?: number;
  max?: number;
  step?: number;
}

/** Reads "1,264", "1264", "−2" and "2.5"; null for an empty field, NaN for anything else. */
export function readNumber(text: string): number | null {
  const plain = text
    .trim()
    .replace(/\u2212/g, '-')
    .replace(/,(?=\d{3}(\D|$))/g, '');
  return plain === ''
    ? null
    : /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain)
      ? Number(plain)
      : Number.NaN;
}

/** A number. Arrow keys step; the field says what is allowed when the number does not fit. */
export function NumberInput({
  value,
  onChange,
  min = -Infinity,
  max = Infinity,
  step = 1,
  error,
  ...rest
}: NumberInputProps) {
  const [draft, setDraft] = useState<string | null>(null);
  const typed = draft === null ? value : readNumber(draft);
  const wrong = typed !== null && (Number.isNaN(typed) || typed < min || typed > max);
  const range =
    Number.isFinite(min) && Number.isFinite(max)
      ? `Use ${min} to ${max}`
      : Number.isFinite(min)
        ? `Use ${min} or more`
        : 'Use a number';
  const accept = (text: string) => {
    setDraft(text);
    const next = readNumber(text);
    if (next === null || (!Number.isNaN(next) && next >= min && next <= max)) onChange(next);
  };
  const bump = (by: number) => {
    const next = Math.min(max, Math.max(min, Number(((value ?? 0) + by).toPrecision(12))));
    setDraft(null);
    onChange(next);
  };
  return (
    <TextInput
      {...rest}
      inputMode="decimal"
      autoComplete="off"
      value={draft ?? (value === null ? '' : String(value))}
      error={error ?? (wrong ? range : undefined)}
      onChange={(event) => accept(event.target.value)}
      onBlur={() => !wrong && setDraft(null)}
      onKeyDown={(event) => {
        if (event.key !== 'ArrowUp' && event.key !== 'ArrowDown') return;
        event.preventDefault();
        bump((event.key === 'ArrowUp' ? step : -step) * (event.shiftKey ? 10 : 1));
      }}
    />
  );
}
