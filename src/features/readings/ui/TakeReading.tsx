import { useState } from 'react';
import { Banner, Button, Dialog, NumberInput, RadioCards, Select } from '@/components/ui';
import { ApiError, sendJson } from '@/lib/api';
import type { ReadingFilter } from '../filter';

export interface Choice {
  id: string;
  name: string;
  observed: number;
  sensitive: boolean;
}

type Kind = 'two-level' | 'gcv' | 'hold-out' | 'tikhonov' | 'heat' | 'low-pass';

const KINDS = [
  {
    value: 'two-level',
    label: 'Let Thrum choose',
    hint: 'A level for each group and a pattern along ties, fitted together; wild scores do not pull their neighbours.',
  },
  {
    value: 'gcv',
    label: 'Tikhonov, cross-validated',
    hint: 'One pattern along ties; its strength is the one that predicts best.',
  },
  {
    value: 'hold-out',
    label: 'Tikhonov, chosen on left-out scores',
    hint: 'Leaves out a tenth of the scores at a time; its strength is the one that predicts them best.',
  },
  { value: 'tikhonov', label: 'Tikhonov, your strength', hint: 'A larger strength smooths more.' },
  { value: 'heat', label: 'Heat kernel', hint: 'Lets scores spread along ties for a while.' },
  { value: 'low-pass', label: 'Low-pass', hint: 'Keeps the smoothest patterns and sets the rest aside.' },
] as const;

const LAPLACIANS = [
  { id: 'combinatorial', label: 'Plain' },
  { id: 'normalised', label: 'Normalised' },
  { id: 'regularised', label: 'Regularised' },
] as const;

const filterOf = (kind: Kind, amount: number | null): ReadingFilter | null => {
  if (kind === 'two-level') return { kind };
  if (kind === 'gcv' || kind === 'hold-out') return { kind: 'tikhonov', alpha: kind };
  if (amount === null) return null;
  if (kind === 'tikhonov') return { kind, alpha: amount };
  return kind === 'heat' ? { kind, tau: amount } : { kind, keep: Math.round(amount) };
};

const AMOUNTS: Partial<
  Record<Kind, { label: string; start: number; min: number; max: number; step: number }>
> = {
  tikhonov: { label: 'Strength α', start: 1, min: 1e-6, max: 1e6, step: 0.5 },
  heat: { label: 'Time τ', start: 1, min: 1e-6, max: 1e6, step: 0.5 },
  'low-pass': { label: 'Frequencies kept', start: 20, min: 1, max: 2_000, step: 1 },
};

/** Asks what to read and how; then goes to the reading, which shows how far it is. */
export function TakeReading(props: {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  snapshotId: string;
  attributes: Choice[];
  base: string;
}) {
  const { open, onOpenChange, snapshotId, attributes, base } = props;
  const [attribute, setAttribute] = useState(attributes[0]?.id ?? null);
  const [kind, setKind] = useState<Kind>('two-level');
  const [amount, setAmount] = useState<number | null>(1);
  const [laplacian, setLaplacian] = useState<(typeof LAPLACIANS)[number]['id']>('combinatorial');
  const [seed, setSeed] = useState<number | null>(1);
  const [pending, setPending] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const dial = AMOUNTS[kind];
  const choose = (next: Kind): void => {
    setKind(next);
    setAmount(AMOUNTS[next]?.start ?? null);
  };

  const take = async (): Promise<void> => {
    const filter = filterOf(kind, amount);
    if (!attribute || !filter) return setProblem('Please fill in every field.');
    setPending(true);
    setProblem(null);
    try {
      const { reading } = await sendJson<{ reading: { id: string } }>(
        'POST',
        `/api/v1/snapshots/${snapshotId}/readings`,
        { attribute, filter, laplacian: kind === 'two-level' ? 'combinatorial' : laplacian, seed: seed ?? 1 },
      );
      window.location.assign(`${base}/${reading.id}?snapshot=${snapshotId}`);
    } catch (cause) {
      setPending(false);
      setProblem(cause instanceof ApiError ? cause.problem.detail : 'That did not work. Please try again.');
    }
  };
  const chosen = attributes.find((one) => one.id === attribute);
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="Take a reading"
      width={520}
      actions={
        <>
          <Button kind="quiet" onClick={() => onOpenChange(false)} disabled={pending}>
            Cancel
          </Button>
          <Button kind="primary" pending={pending} onClick={() => void take()}>
            Take reading
          </Button>
        </>
      }
    >
      <Select
        label="Attribute"
        options={attributes.map((one) => ({
          id: one.id,
          label: one.name,
          description: `${one.observed} scores${one.sensitive ? ', sensitive' : ''}`,
        }))}
        value={attribute}
        onChange={setAttribute}
        full
        hint={chosen?.sensitive ? 'Marked as sensitive: no cases can be opened from it.' : undefined}
      />
      <RadioCards legend="Smoother" options={KINDS} value={kind} onChange={choose} name="smoother" />
      {dial && (
        <NumberInput
          key={kind}
          label={dial.label}
          value={amount}
          onChange={setAmount}
          min={dial.min}
          max={dial.max}
          step={dial.step}
        />
      )}
      {kind !== 'two-level' && (
        <Select label="Laplacian" options={LAPLACIANS} value={laplacian} onChange={setLaplacian} full />
      )}
      <NumberInput
        label="Seed"
        hint="The same seed gives the same reading, to the last digit."
        value={seed}
        onChange={setSeed}
        min={0}
        max={2_147_483_647}
      />
      {problem && <Banner tone="error">{problem}</Banner>}
    </Dialog>
  );
}
