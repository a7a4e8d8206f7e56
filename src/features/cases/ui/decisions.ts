import type { Decision } from '../cases';

/** The decisions in the order of the keys 1 to 5, with what follows from each. */
export const CHOICES: readonly { value: Decision; label: string; hint: string }[] = [
  { value: 'no-concern', label: 'No concern', hint: 'Close. Nothing follows from it.' },
  { value: 'keep-watching', label: 'Keep watching', hint: 'Return after the next snapshot.' },
  { value: 'reach-out', label: 'Reach out', hint: 'A private, friendly message first.' },
  { value: 'escalate', label: 'Escalate', hint: 'A second person must agree.' },
  { value: 'data-error', label: 'Data error', hint: 'The score itself is wrong.' },
];

export const decisionWords = (decision: Decision | null): string =>
  CHOICES.find((one) => one.value === decision)?.label ?? '';
